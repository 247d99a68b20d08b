import { readGains } from '../../../services/blocks/readGains'

/** GET /api/conditions/[conditionId]/gains: the gain of every block of the system in an operating condition, as the engine takes it. */
export default defineApiHandler('GET /api/conditions/[conditionId]/gains', {}, ({ params }) => readGains(params.conditionId))
