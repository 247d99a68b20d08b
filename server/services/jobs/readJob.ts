import { AppError } from '#shared/errors/AppError'
import type { Job } from '#shared/types/report'
import { JobRow } from '../../database/models/JobRow'
import { presentJob } from '../../presenters/presentJob'

/** A job by id; throws 'not found'. */
export async function readJob(jobId: number): Promise<Job> {
  const job = await JobRow.findByPk(jobId)
  if (job === null) throw new AppError('notFound', 'There is no such job.')
  return presentJob(job)
}
