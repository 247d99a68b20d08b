import { conditionCopySchema } from '#shared/schemas/condition'
import { copyCondition } from '../../../services/conditions/copyCondition'

/** POST /api/conditions/[conditionId]/copy: copies the operating condition with all its sources. */
export default defineApiHandler('POST /api/conditions/[conditionId]/copy', { body: conditionCopySchema, status: 201 }, ({ params, body, context }) => copyCondition(params.conditionId, body, context))
