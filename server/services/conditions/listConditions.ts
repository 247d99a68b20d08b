import type { OperatingCondition } from '#shared/types/system'
import { ConditionRow } from '../../database/models/ConditionRow'
import { presentCondition } from '../../presenters/presentCondition'

/** The operating conditions of a system in their order. */
export async function listConditions(systemId: number): Promise<OperatingCondition[]> {
  return (await ConditionRow.findAll({ where: { systemId }, order: ['position', 'id'] })).map(presentCondition)
}
