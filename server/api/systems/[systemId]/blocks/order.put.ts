import { orderSchema } from '#shared/schemas/order'
import { orderBlocks } from '../../../../services/blocks/orderBlocks'

/** PUT /api/systems/[systemId]/blocks/order: the order of the blocks. */
export default defineApiHandler('PUT /api/systems/[systemId]/blocks/order', { body: orderSchema }, ({ params, body, context }) => orderBlocks(params.systemId, body.ids, context))
