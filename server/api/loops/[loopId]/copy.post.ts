import { loopCopySchema } from '#shared/schemas/loop'
import { copyLoop } from '../../../services/loops/copyLoop'

/** POST /api/loops/[loopId]/copy: copies the loop with all its sources. */
export default defineApiHandler('POST /api/loops/[loopId]/copy', { body: loopCopySchema, status: 201 }, ({ params, body, context }) => copyLoop(params.loopId, body, context))
