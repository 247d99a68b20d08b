import { deleteCondition } from '../../../services/conditions/deleteCondition'

/** DELETE /api/conditions/[conditionId]: takes the operating condition out of sight until it is restored. */
export default defineApiHandler('DELETE /api/conditions/[conditionId]', {}, ({ params, context }) => deleteCondition(params.conditionId, context))
