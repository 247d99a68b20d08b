import type { Job } from '#shared/types/report'
import { presentJob } from '../../presenters/presentJob'
import { findJob } from './findJob'

/** How far a job has come; throws 'not found'. */
export const readJob = async (jobId: number): Promise<Job> => presentJob(await findJob(jobId))
