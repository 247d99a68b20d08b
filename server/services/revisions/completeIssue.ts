import { AppError } from '#shared/errors/AppError'
import { recordAudit } from '../../audit/recordAudit'
import type { PersonRow } from '../../database/models/PersonRow'
import { RevisionRow } from '../../database/models/RevisionRow'
import { findReport } from '../reports/findReport'
import { approverObstacle } from './approverObstacle'
import { obstaclesOf } from './obstaclesOf'

/**
 * Makes a draft the issued revision and the former one superseded, in the write transaction that stores its issued artefacts.
 * The guards are asked again here: between the approver's act and the end of rendering a newer draft may have been frozen, or the approver's
 * role taken away.
 */
export async function completeIssue(revisionId: number, approver: PersonRow, issuedAt: string): Promise<void> {
  const revision = await RevisionRow.findByPk(revisionId)
  if (revision === null) throw new AppError('notFound', 'There is no such revision.')
  const { systemId } = await findReport(revision.reportId)
  const obstacle = await approverObstacle(approver.id, systemId)
  const obstacles = [...(obstacle === null ? [] : [obstacle]), ...await obstaclesOf(revision, approver.id, { whileIssuing: true })]
  if (obstacles.length > 0) throw new AppError('refused', `This draft could not be issued. ${obstacles.join(' ')}`, { details: { obstacles } })
  const context = { actor: { id: approver.id, name: approver.name, email: approver.email, isAdministrator: approver.isAdministrator }, clock: () => new Date(issuedAt) }
  const former = await RevisionRow.findOne({ where: { reportId: revision.reportId, state: 'issued' } })
  if (former !== null) {
    await former.update({ state: 'superseded' })
    await recordAudit(context, 'revision superseded', { systemId, subjectId: former.id, payload: { letter: former.letter, by: revision.letter } })
  }
  await revision.update({ state: 'issued', issuedBy: approver.id, issuedByName: approver.name, issuedAt })
  await recordAudit(context, 'revision issued', { systemId, subjectId: revisionId, payload: { letter: revision.letter, draftNumber: revision.draftNumber } })
}
