import { deleteLoop } from '../../../services/loops/deleteLoop'

/** DELETE /api/loops/[loopId]: takes the loop out of sight until it is restored. */
export default defineApiHandler('DELETE /api/loops/[loopId]', {}, ({ params, context }) => deleteLoop(params.loopId, context))
