import { cancelRendering } from '../../../services/jobs/cancelRendering'

/** POST /api/jobs/[jobId]/cancel: ends a job that waits or runs. */
export default defineApiHandler('POST /api/jobs/[jobId]/cancel', {}, ({ params, systemId, roles, context }) => cancelRendering(params.jobId, systemId, roles, context))
