import { readRevision } from '../../../services/revisions/readRevision'
import { revisionReader } from '../../../services/revisions/RevisionReader'

/** GET /api/revisions/[revisionId]: a revision with its artefacts and its newest job. */
export default defineApiHandler('GET /api/revisions/[revisionId]', {}, ({ params, actor, roles }) => readRevision(params.revisionId, revisionReader(actor, roles)))
