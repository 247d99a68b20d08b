import { listParameters } from '../../../services/parameters/listParameters'

/** GET /api/systems/[systemId]/parameters: the parameters with their values in each condition. */
export default defineApiHandler('GET /api/systems/[systemId]/parameters', {}, ({ params }) => listParameters(params.systemId))
