import type { Revision } from '#shared/types/report'
import { ArtefactRow } from '../../database/models/ArtefactRow'
import { JobRow } from '../../database/models/JobRow'
import { RevisionRow } from '../../database/models/RevisionRow'
import { presentJob } from '../../presenters/presentJob'
import { presentArtefact, presentRevision } from '../../presenters/presentRevision'
import { obstaclesOf } from './obstaclesOf'
import type { RevisionReader } from './RevisionReader'

/** States that those see who may read issued revisions only. */
export const readableStates = ['issued', 'superseded'] as const

/** Rows of revisions with what surrounds them, as this reader may see them. */
export async function presentRevisions(rows: RevisionRow[], reader: RevisionReader): Promise<Revision[]> {
  const ids = rows.map(({ id }) => id)
  const [artefacts, jobs] = await Promise.all([
    ArtefactRow.findAll({ where: { revisionId: ids, ...(!reader.seesDrafts && { edition: 'issued' }) }, order: [['id', 'ASC']] }),
    reader.seesDrafts ? JobRow.findAll({ where: { revisionId: ids }, order: [['id', 'DESC']] }) : [],
  ])
  return Promise.all(rows.map(async (row) => {
    const job = jobs.find(({ revisionId }) => revisionId === row.id)
    return presentRevision(row, {
      artefacts: artefacts.filter(({ revisionId }) => revisionId === row.id).map(presentArtefact),
      job: job ? presentJob(job) : null,
      obstacles: row.state === 'draft' ? await obstaclesOf(row, reader.actorId) : [],
    })
  }))
}

/** The revisions of a report, newest first, as this reader may see them. */
export async function listRevisions(reportId: number, reader: RevisionReader): Promise<Revision[]> {
  const rows = await RevisionRow.findAll({ where: { reportId, ...(!reader.seesDrafts && { state: [...readableStates] }) }, order: [['id', 'DESC']] })
  return presentRevisions(rows, reader)
}
