import { readBoard } from '../../../services/systems/readBoard'

/** GET /api/systems/[systemId]/board: every loop in every condition, analysed and judged. */
export default defineApiHandler('GET /api/systems/[systemId]/board', {}, ({ params, context }) => readBoard(params.systemId, context))
