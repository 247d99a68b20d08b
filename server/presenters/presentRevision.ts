import type { Artefact, Job, Revision } from '#shared/types/report'
import { revisionLabel } from '#shared/workflow/revisionLabel'
import type { ArtefactRow } from '../database/models/ArtefactRow'
import type { RevisionRow } from '../database/models/RevisionRow'

export const presentArtefact = ({ kind, edition, fileName, mediaType, size, sha256 }: ArtefactRow): Artefact => ({ kind, edition, fileName, mediaType, size, sha256 })

export interface RevisionSurroundings {
  artefacts: Artefact[]
  job: Job | null
  obstacles: string[]
}

export const presentRevision = (row: RevisionRow, { artefacts, job, obstacles }: RevisionSurroundings): Revision => ({
  id: row.id,
  reportId: row.reportId,
  letter: row.letter,
  draftNumber: row.draftNumber,
  label: revisionLabel(row),
  state: row.state,
  changeNote: row.changeNote,
  snapshotSha256: row.snapshotSha256,
  frozenBy: row.frozenByName,
  frozenAt: row.frozenAt,
  issuedBy: row.issuedByName,
  issuedAt: row.issuedAt,
  artefacts,
  job,
  obstacles,
})
