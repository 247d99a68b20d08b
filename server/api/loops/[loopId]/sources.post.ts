import { newSourceSchema } from '#shared/schemas/source'
import { createSources } from '../../../services/sources/createSources'

/** POST /api/loops/[loopId]/sources: a new source, one row for each condition. */
export default defineApiHandler('POST /api/loops/[loopId]/sources', { body: newSourceSchema, status: 201 }, ({ params, body, context }) => createSources(params.loopId, body, context))
