import { newReportSchema } from '#shared/schemas/report'
import { createReport } from '../../../../services/reports/createReport'

/** POST /api/systems/[systemId]/reports: a report that covers every loop and condition. */
export default defineApiHandler('POST /api/systems/[systemId]/reports', { body: newReportSchema, status: 201 }, ({ params, body, context }) => createReport(params.systemId, body, context))
