import { deleteReport } from '../../../services/reports/deleteReport'

/** DELETE /api/reports/[reportId]: takes it out of sight. */
export default defineApiHandler('DELETE /api/reports/[reportId]', {}, ({ params, context }) => deleteReport(params.reportId, context))
