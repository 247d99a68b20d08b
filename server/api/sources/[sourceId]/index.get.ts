import { readSource } from '../../../services/sources/readSource'

/** GET /api/sources/[sourceId]: the source with its analysis. */
export default defineApiHandler('GET /api/sources/[sourceId]', {}, ({ params, context }) => readSource(params.sourceId, context))
