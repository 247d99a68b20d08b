import { listReports } from '../../../../services/reports/listReports'
import { revisionReader } from '../../../../services/revisions/RevisionReader'

/** GET /api/systems/[systemId]/reports: the reports of a system with their revisions, newest first. */
export default defineApiHandler('GET /api/systems/[systemId]/reports', {}, ({ params, actor, roles }) => listReports(params.systemId, revisionReader(actor, roles)))
