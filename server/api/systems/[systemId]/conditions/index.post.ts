import { newConditionSchema } from '#shared/schemas/condition'
import { createCondition } from '../../../../services/conditions/createCondition'

/** POST /api/systems/[systemId]/conditions: makes an operating condition at the end of the list. */
export default defineApiHandler('POST /api/systems/[systemId]/conditions', { body: newConditionSchema, status: 201 }, ({ params, body, context }) => createCondition(params.systemId, body, context))
