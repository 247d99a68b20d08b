import { AppError } from '#shared/errors/AppError'
import { ConditionRow } from '../../database/models/ConditionRow'

/** An operating condition by id; throws 'not found'. */
export async function findCondition(conditionId: number): Promise<ConditionRow> {
  const condition = await ConditionRow.findByPk(conditionId)
  if (condition === null) throw new AppError('notFound', 'There is no such operating condition.')
  return condition
}
