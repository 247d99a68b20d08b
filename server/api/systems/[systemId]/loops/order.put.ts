import { orderSchema } from '#shared/schemas/order'
import { orderLoops } from '../../../../services/loops/orderLoops'

/** PUT /api/systems/[systemId]/loops/order: puts the loops in this order. */
export default defineApiHandler('PUT /api/systems/[systemId]/loops/order', { body: orderSchema }, ({ params, body, context }) => orderLoops(params.systemId, body.ids, context))
