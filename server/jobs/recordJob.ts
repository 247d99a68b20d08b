import { JobEvent } from '../database/models/JobEvent'
import type { JobRow } from '../database/models/JobRow'
import { transactionContext } from '../database/transactionContext'
import { presentJob } from '../presenters/presentJob'
import { jobSignals } from './jobSignals'

type Change = Partial<Pick<JobRow, 'state' | 'step' | 'done' | 'total' | 'error' | 'attempts' | 'leaseUntil' | 'finishedAt'>>

/**
 * Changes a job and adds the event that its followers read, in the running write transaction. Followers are woken a moment
 * later; one that comes before the commit reads again with the next beat.
 */
export async function recordJob(job: JobRow, change: Change, now: Date): Promise<void> {
  if (!transactionContext.get('transaction')) throw new Error('a job changes in a write transaction only')
  await job.update(change)
  const last = await JobEvent.max<number | null, JobEvent>('sequence', { where: { jobId: job.id } })
  await JobEvent.create({ jobId: job.id, sequence: (last ?? 0) + 1, payload: presentJob(job), createdAt: now.toISOString() })
  const jobId = job.id
  setTimeout(() => jobSignals.emit('changed', jobId), 20).unref()
}
