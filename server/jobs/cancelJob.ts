import { AppError } from '#shared/errors/AppError'
import { writeTransaction } from '../database/database'
import { JobRow } from '../database/models/JobRow'
import { afterCommit } from './afterCommit'
import { jobSignals } from './jobSignals'
import { recordJob } from './recordJob'

/** Ends a job that is queued or running; what was frozen stays as it is. Throws 'conflict' for a job that has ended. */
export function cancelJob(jobId: number, now: Date): Promise<JobRow> {
  return writeTransaction(async () => {
    const found = await JobRow.findByPk(jobId)
    if (!found) throw new AppError('notFound', 'There is no such job.')
    if (found.state !== 'queued' && found.state !== 'running') throw new AppError('conflict', `This job is ${found.state} already.`)
    await recordJob(found, { state: 'cancelled', step: 'Cancelled', leaseUntil: null, finishedAt: now.toISOString() }, now)
    afterCommit(() => jobSignals.emit('cancelled', jobId))
    return found
  })
}
