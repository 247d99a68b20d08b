import { newLoopSchema } from '#shared/schemas/loop'
import { createLoop } from '../../../../services/loops/createLoop'

/** POST /api/systems/[systemId]/loops: makes a loop at the end of the list. */
export default defineApiHandler('POST /api/systems/[systemId]/loops', { body: newLoopSchema, status: 201 }, ({ params, body, context }) => createLoop(params.systemId, body, context))
