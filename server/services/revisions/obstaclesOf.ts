import { issueObstacles } from '#shared/workflow/issueObstacles'
import { ArtefactRow } from '../../database/models/ArtefactRow'
import { JobRow } from '../../database/models/JobRow'
import { RevisionRow } from '../../database/models/RevisionRow'
import { unprovenCells } from './unprovenCells'

/** Why this person cannot issue a draft; empty when they can. `whileIssuing`: asked by the very job that issues it. */
export async function obstaclesOf(revision: RevisionRow, actorId: number, { whileIssuing = false } = {}): Promise<string[]> {
  const [siblings, artefacts, openJobs, unproven] = await Promise.all([
    RevisionRow.findAll({ where: { reportId: revision.reportId, letter: revision.letter }, attributes: ['id', 'state', 'draftNumber'] }),
    ArtefactRow.findAll({ where: { revisionId: revision.id, edition: 'draft' }, attributes: ['kind'] }),
    JobRow.count({ where: { revisionId: revision.id, edition: 'issued', state: ['queued', 'running'] } }),
    unprovenCells(revision.id),
  ])
  return issueObstacles({
    state: revision.state,
    letter: revision.letter,
    letterIsIssued: siblings.some(({ id, state }) => id !== revision.id && state !== 'draft'),
    hasNewerDraft: siblings.some(({ draftNumber }) => draftNumber > revision.draftNumber),
    isOwnWork: revision.frozenBy === actorId,
    draftArtefacts: artefacts.map(({ kind }) => kind),
    unproven,
    isBeingIssued: openJobs > 0 && !whileIssuing,
  })
}
