import { renderAgain } from '../../../services/revisions/renderAgain'

/** POST /api/revisions/[revisionId]/render: queues a rendering once more after it failed or was cancelled. */
export default defineApiHandler('POST /api/revisions/[revisionId]/render', {}, ({ params, context }) => renderAgain(params.revisionId, context))
