import { newBlockSchema } from '#shared/schemas/block'
import { limits } from '#shared/schemas/limits'
import { createBlock } from '../../../../services/blocks/createBlock'

/** POST /api/systems/[systemId]/blocks: a new block at the end of the list. */
export default defineApiHandler('POST /api/systems/[systemId]/blocks', { body: newBlockSchema, bodyLimit: limits.blockBytes, status: 201 }, ({ params, body, context }) => createBlock(params.systemId, body, context))
