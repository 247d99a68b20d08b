import { readReport } from '../../../services/reports/readReport'
import { revisionReader } from '../../../services/revisions/RevisionReader'

/** GET /api/reports/[reportId]: a report with what its draft is made from and its revisions. */
export default defineApiHandler('GET /api/reports/[reportId]', {}, ({ params, actor, roles }) => readReport(params.reportId, revisionReader(actor, roles), roles))
