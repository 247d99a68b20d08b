import { AppError } from '#shared/errors/AppError'
import { JobRow } from '../../database/models/JobRow'

/** A job by id; throws 'not found'. */
export async function findJob(jobId: number): Promise<JobRow> {
  const job = await JobRow.findByPk(jobId)
  if (job === null) throw new AppError('notFound', 'There is no such job.')
  return job
}
