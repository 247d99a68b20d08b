import { blockChangeSchema } from '#shared/schemas/block'
import { limits } from '#shared/schemas/limits'
import { updateBlock } from '../../../services/blocks/updateBlock'

/** PATCH /api/blocks/[blockId]: changes the named fields. */
export default defineApiHandler('PATCH /api/blocks/[blockId]', { body: blockChangeSchema, bodyLimit: limits.blockBytes }, ({ params, body, context }) => updateBlock(params.blockId, body, context))
