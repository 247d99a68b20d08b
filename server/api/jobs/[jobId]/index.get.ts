import { readJob } from '../../../services/jobs/readJob'

/** GET /api/jobs/[jobId]: how far a job has come. */
export default defineApiHandler('GET /api/jobs/[jobId]', {}, ({ params }) => readJob(params.jobId))
