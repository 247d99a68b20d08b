import { loopChangeSchema } from '#shared/schemas/loop'
import { updateLoop } from '../../../services/loops/updateLoop'

/** PATCH /api/loops/[loopId]: changes the named fields. */
export default defineApiHandler('PATCH /api/loops/[loopId]', { body: loopChangeSchema }, ({ params, body, context }) => updateLoop(params.loopId, body, context))
