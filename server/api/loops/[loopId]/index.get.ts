import { readLoop } from '../../../services/loops/readLoop'

/** GET /api/loops/[loopId]: the loop with all that its page shows. */
export default defineApiHandler('GET /api/loops/[loopId]', {}, async ({ params, roles, context }) => ({ ...await readLoop(params.loopId, context), roles }))
