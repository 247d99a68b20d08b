import { newRevisionSchema } from '#shared/schemas/revision'
import { freezeRevision } from '../../../../services/revisions/freezeRevision'

/** POST /api/reports/[reportId]/revisions: freezes the next draft and queues its rendering. */
export default defineApiHandler('POST /api/reports/[reportId]/revisions', { body: newRevisionSchema, status: 201 }, ({ params, body, context }) => freezeRevision(params.reportId, body, context))
