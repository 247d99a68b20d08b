import { conditionChangeSchema } from '#shared/schemas/condition'
import { updateCondition } from '../../../services/conditions/updateCondition'

/** PATCH /api/conditions/[conditionId]: changes the named fields. */
export default defineApiHandler('PATCH /api/conditions/[conditionId]', { body: conditionChangeSchema }, ({ params, body, context }) => updateCondition(params.conditionId, body, context))
