import { orderSchema } from '#shared/schemas/order'
import { orderConditions } from '../../../../services/conditions/orderConditions'

/** PUT /api/systems/[systemId]/conditions/order: puts the operating conditions in this order. */
export default defineApiHandler('PUT /api/systems/[systemId]/conditions/order', { body: orderSchema }, ({ params, body, context }) => orderConditions(params.systemId, body.ids, context))
