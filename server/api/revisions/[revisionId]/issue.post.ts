import { issueSchema } from '#shared/schemas/revision'
import { issueRevision } from '../../../services/revisions/issueRevision'

/** POST /api/revisions/[revisionId]/issue: queues the issued edition; the revision is valid when its artefacts are stored. */
export default defineApiHandler('POST /api/revisions/[revisionId]/issue', { body: issueSchema }, ({ params, context }) => issueRevision(params.revisionId, context))
