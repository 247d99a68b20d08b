import { deleteSource } from '../../../services/sources/deleteSource'

/** DELETE /api/sources/[sourceId]: takes the source out of sight until it is restored. */
export default defineApiHandler('DELETE /api/sources/[sourceId]', {}, ({ params, context }) => deleteSource(params.sourceId, context))
