import { sourceChangeSchema } from '#shared/schemas/source'
import { updateSource } from '../../../services/sources/updateSource'

/** PUT /api/sources/[sourceId]: changes the source and analyses it. */
export default defineApiHandler('PUT /api/sources/[sourceId]', { body: sourceChangeSchema }, ({ params, body, context }) => updateSource(params.sourceId, body, context))
