import { reportChangeSchema } from '#shared/schemas/report'
import { updateReport } from '../../../services/reports/updateReport'

/** PATCH /api/reports/[reportId]: changes the named fields. */
export default defineApiHandler('PATCH /api/reports/[reportId]', { body: reportChangeSchema }, ({ params, body, context }) => updateReport(params.reportId, body, context))
