import type { Job } from '#shared/types/report'
import { callApi } from './apiClient'

const at = (jobId: number) => `/api/jobs/${jobId}`

/** Routes of rendering jobs. */
export const jobsClient = {
  read: (jobId: number) => callApi<Job>('GET', at(jobId)),
  cancel: (jobId: number) => callApi<Job>('POST', `${at(jobId)}/cancel`),
  eventsPath: (jobId: number) => `${at(jobId)}/events`,
}
