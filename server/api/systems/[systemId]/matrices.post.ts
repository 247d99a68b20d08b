import { matricesSchema } from '#shared/schemas/block'
import { listMatrices } from '../../../services/blocks/listMatrices'

/** POST /api/systems/[systemId]/matrices: what an uploaded file of state-space matrices holds. */
export default defineApiHandler('POST /api/systems/[systemId]/matrices', { body: matricesSchema }, ({ params, body }) => listMatrices(params.systemId, body))
