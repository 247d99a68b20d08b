import { parametersSchema } from '#shared/schemas/parameter'
import { replaceParameters } from '../../../services/parameters/replaceParameters'

/** PUT /api/systems/[systemId]/parameters: sets the list of parameters. */
export default defineApiHandler('PUT /api/systems/[systemId]/parameters', { body: parametersSchema }, ({ params, body, context }) => replaceParameters(params.systemId, body.parameters, context, body.madeFrom))
