import { QueryTypes } from 'sequelize'
import { AppError } from '#shared/errors/AppError'
import type { ArtefactKind, Edition } from '#shared/types/report'
import { database } from '../../database/database'
import { ArtefactRow } from '../../database/models/ArtefactRow'
import { findRevision } from './findRevision'
import type { RevisionReader } from './RevisionReader'

/** Bytes read from the database at once. */
const chunkSize = 256 * 1024

/** The stored bytes piece by piece, so that a large file is never held whole. */
async function* bytesOf(sha256: string, size: number): AsyncGenerator<Buffer> {
  for (let from = 0; from < size; from += chunkSize) {
    const [row] = await database().query<{ part: Buffer }>('SELECT substr(bytes, :from, :count) AS part FROM artefact_blobs WHERE sha256 = :sha256', {
      type: QueryTypes.SELECT, replacements: { sha256, from: from + 1, count: chunkSize },
    })
    if (!row) throw new AppError('unexpected', 'The bytes of an artefact are missing from the database.')
    yield row.part
  }
}

export interface StoredArtefact {
  fileName: string
  mediaType: string
  size: number
  sha256: string
  bytes: () => AsyncGenerator<Buffer>
}

/**
 * An artefact of a revision. Without an edition the one that is valid: the issued edition of what was issued, the draft of a draft.
 * Throws 'not found', also for the draft's edition where drafts are not for this reader.
 */
export async function readArtefact(revisionId: number, kind: ArtefactKind, wanted: Edition | undefined, reader: RevisionReader): Promise<StoredArtefact> {
  const revision = await findRevision(revisionId, reader)
  const edition = wanted ?? (revision.state === 'draft' ? 'draft' : 'issued')
  const artefact = edition === 'draft' && !reader.seesDrafts ? null : await ArtefactRow.findOne({ where: { revisionId, kind, edition } })
  if (artefact === null) throw new AppError('notFound', `There is no ${kind.toUpperCase()} of this edition; it may not be rendered yet.`)
  const { fileName, mediaType, size, sha256 } = artefact
  return { fileName, mediaType, size, sha256, bytes: () => bytesOf(sha256, size) }
}
