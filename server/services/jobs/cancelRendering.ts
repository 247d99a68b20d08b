import { AppError } from '#shared/errors/AppError'
import { can } from '#shared/access/rules'
import type { Role } from '#shared/types/person'
import type { Job } from '#shared/types/report'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { cancelJob } from '../../jobs/cancelJob'
import { presentJob } from '../../presenters/presentJob'
import type { ServiceContext } from '../context'
import { findJob } from './findJob'

/** Cancels a rendering. Who may freeze may cancel a draft's, who may issue an issue; anyone their own. */
export async function cancelRendering(jobId: number, systemId: number | null, roles: readonly Role[], context: ServiceContext): Promise<Job> {
  const found = await findJob(jobId)
  const facts = { signedIn: true, isAdministrator: context.actor.isAdministrator, roles }
  const mayCancel = found.requestedBy === context.actor.id || can(found.edition === 'issued' ? 'issue a revision' : 'freeze a revision', facts)
  if (!mayCancel) throw new AppError('notAllowed', 'Your role does not allow this.')
  return writeTransaction(async () => {
    const job = await cancelJob(jobId, context.clock())
    await recordAudit(context, 'rendering cancelled', { ...(systemId !== null && { systemId }), subjectId: job.revisionId, payload: { jobId, edition: job.edition } })
    return presentJob(job)
  })
}
