import { criteriaSchema } from '#shared/schemas/criterion'
import { replaceCriteria } from '../../../services/criteria/replaceCriteria'

/** PUT /api/systems/[systemId]/criteria: sets the criteria. */
export default defineApiHandler('PUT /api/systems/[systemId]/criteria', { body: criteriaSchema }, ({ params, body, context }) => replaceCriteria(params.systemId, body.criteria, context))
