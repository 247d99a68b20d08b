import { AppError } from '#shared/errors/AppError'
import type { Job } from '#shared/types/report'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { ArtefactRow } from '../../database/models/ArtefactRow'
import { JobRow } from '../../database/models/JobRow'
import { RevisionRow } from '../../database/models/RevisionRow'
import { enqueueJob } from '../../jobs/enqueueJob'
import { presentJob } from '../../presenters/presentJob'
import type { ServiceContext } from '../context'
import { approverObstacle } from './approverObstacle'
import { findReport } from '../reports/findReport'

/**
 * Queues the newest rendering of a revision once more after it failed or was cancelled. A failed issue stays the act of the approver
 * who asked for it; one that was cancelled has to be asked for again by an approver.
 */
export function renderAgain(revisionId: number, context: ServiceContext): Promise<Job> {
  return writeTransaction(async () => {
    const revision = await RevisionRow.findByPk(revisionId)
    if (revision === null) throw new AppError('notFound', 'There is no such revision.')
    const last = await JobRow.findOne({ where: { revisionId }, order: [['id', 'DESC']] })
    const edition = last?.edition ?? 'draft'
    if (last?.state === 'queued' || last?.state === 'running') throw new AppError('conflict', 'This document is being rendered already.')
    if (await ArtefactRow.count({ where: { revisionId, edition } }) > 0) throw new AppError('conflict', 'This document is rendered already.')
    if (edition === 'issued' && last?.state === 'cancelled') throw new AppError('refused', 'Issuing was cancelled: an approver has to issue this draft again.')
    const { systemId } = await findReport(revision.reportId)
    const issue = edition === 'issued' ? last : null
    const obstacle = issue && await approverObstacle(issue.requestedBy, systemId)
    if (obstacle) throw new AppError('refused', obstacle, { details: { obstacles: [obstacle] } })
    // The date of issue is that of the approver's act, whenever the document is rendered.
    const job = await enqueueJob({ revisionId, edition, requestedBy: issue?.requestedBy ?? context.actor.id }, issue ? new Date(issue.createdAt) : context.clock())
    await recordAudit(context, 'rendering asked for', { systemId, subjectId: revisionId, payload: { edition } })
    return presentJob(job)
  })
}
