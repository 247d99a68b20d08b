import { restoreReport } from '../../../services/reports/restoreReport'

/** POST /api/reports/[reportId]/restore: brings it back. */
export default defineApiHandler('POST /api/reports/[reportId]/restore', {}, ({ params, context }) => restoreReport(params.reportId, context))
