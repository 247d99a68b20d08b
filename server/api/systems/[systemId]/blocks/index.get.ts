import { listBlocksInUse } from '../../../../services/blocks/listBlocksInUse'

/** GET /api/systems/[systemId]/blocks: the blocks in their order, with what depends on each. */
export default defineApiHandler('GET /api/systems/[systemId]/blocks', {}, ({ params }) => listBlocksInUse(params.systemId))
