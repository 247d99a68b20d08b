import { deleteBlock } from '../../../services/blocks/deleteBlock'

/** DELETE /api/blocks/[blockId]: takes the block out of sight until it is restored. */
export default defineApiHandler('DELETE /api/blocks/[blockId]', {}, ({ params, context }) => deleteBlock(params.blockId, context))
