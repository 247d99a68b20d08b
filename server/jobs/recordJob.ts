import { JobEvent } from '../database/models/JobEvent'
import type { JobRow } from '../database/models/JobRow'
import { presentJob } from '../presenters/presentJob'
import { afterCommit } from './afterCommit'
import { jobSignals } from './jobSignals'

type Change = Partial<Pick<JobRow, 'state' | 'step' | 'done' | 'total' | 'error' | 'attempts' | 'leaseUntil' | 'finishedAt'>>

/** Changes a job and adds the event that its followers read, in the running write transaction; they are woken when it is committed. */
export async function recordJob(job: JobRow, change: Change, now: Date): Promise<void> {
  await job.update(change)
  const last = await JobEvent.max<number | null, JobEvent>('sequence', { where: { jobId: job.id } })
  await JobEvent.create({ jobId: job.id, sequence: (last ?? 0) + 1, payload: presentJob(job), createdAt: now.toISOString() })
  const jobId = job.id
  afterCommit(() => jobSignals.emit('changed', jobId))
}
