import type { Edition } from '#shared/types/report'
import { ArtefactBlob } from '../../database/models/ArtefactBlob'
import { ArtefactRow } from '../../database/models/ArtefactRow'
import type { ProducedArtefact } from '../../reports/produceReport'
import { sha256Of } from '../../reports/sha256Of'

/** Stores the artefacts of one edition of a revision in the running write transaction, each once under the SHA-256 of its bytes. */
export async function storeArtefacts(revisionId: number, edition: Edition, artefacts: readonly ProducedArtefact[]): Promise<void> {
  for (const { kind, fileName, mediaType, bytes } of artefacts) {
    const sha256 = sha256Of(bytes)
    if (await ArtefactBlob.count({ where: { sha256 } }) === 0) await ArtefactBlob.create({ sha256, bytes })
    await ArtefactRow.create({ revisionId, edition, kind, fileName, mediaType, size: bytes.length, sha256 })
  }
}
