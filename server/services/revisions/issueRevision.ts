import { AppError } from '#shared/errors/AppError'
import type { Revision } from '#shared/types/report'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { RevisionRow } from '../../database/models/RevisionRow'
import { enqueueJob } from '../../jobs/enqueueJob'
import type { ServiceContext } from '../context'
import { findReport } from '../reports/findReport'
import { presentRevisions } from './listRevisions'
import { obstaclesOf } from './obstaclesOf'

/**
 * Issues a frozen draft: queues the edition that carries the letter, the approver and the date. The draft becomes issued, and the former
 * issued revision superseded, in the transaction that stores its artefacts. Throws 'refused' with every obstacle in words.
 */
export async function issueRevision(revisionId: number, context: ServiceContext): Promise<Revision> {
  const row = await writeTransaction(async () => {
    const found = await RevisionRow.findByPk(revisionId)
    if (found === null) throw new AppError('notFound', 'There is no such revision.')
    const obstacles = await obstaclesOf(found, context.actor.id)
    if (obstacles.length > 0) throw new AppError('refused', `This draft cannot be issued. ${obstacles.join(' ')}`, { details: { obstacles } })
    const { systemId } = await findReport(found.reportId)
    await enqueueJob({ revisionId, edition: 'issued', requestedBy: context.actor.id }, context.clock())
    await recordAudit(context, 'revision issue asked for', { systemId, subjectId: revisionId, payload: { letter: found.letter, draftNumber: found.draftNumber } })
    return found
  })
  const [revision] = await presentRevisions([row], { actorId: context.actor.id, seesDrafts: true })
  if (!revision) throw new AppError('notFound', 'There is no such revision.')
  return revision
}
