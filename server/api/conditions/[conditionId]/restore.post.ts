import { restoreCondition } from '../../../services/conditions/restoreCondition'

/** POST /api/conditions/[conditionId]/restore: brings a deleted operating condition back. */
export default defineApiHandler('POST /api/conditions/[conditionId]/restore', {}, ({ params, context }) => restoreCondition(params.conditionId, context))
