import { restoreBlock } from '../../../services/blocks/restoreBlock'

/** POST /api/blocks/[blockId]/restore: brings a deleted block back. */
export default defineApiHandler('POST /api/blocks/[blockId]/restore', {}, ({ params, context }) => restoreBlock(params.blockId, context))
