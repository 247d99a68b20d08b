import { compareRevisions } from '../../../../services/revisions/compareRevisions'
import { revisionReader } from '../../../../services/revisions/RevisionReader'

/** GET /api/revisions/[revisionId]/comparison/[otherId]: what two revisions of a report say differently. */
export default defineApiHandler('GET /api/revisions/[revisionId]/comparison/[otherId]', {}, ({ params, actor, roles }) => (
  compareRevisions(params.revisionId, params.otherId, revisionReader(actor, roles))
))
