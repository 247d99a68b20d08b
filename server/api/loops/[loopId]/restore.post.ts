import { restoreLoop } from '../../../services/loops/restoreLoop'

/** POST /api/loops/[loopId]/restore: brings a deleted loop back. */
export default defineApiHandler('POST /api/loops/[loopId]/restore', {}, ({ params, context }) => restoreLoop(params.loopId, context))
