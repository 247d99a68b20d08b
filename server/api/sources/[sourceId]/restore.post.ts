import { restoreSource } from '../../../services/sources/restoreSource'

/** POST /api/sources/[sourceId]/restore: brings a deleted source back. */
export default defineApiHandler('POST /api/sources/[sourceId]/restore', {}, ({ params, context }) => restoreSource(params.sourceId, context))
