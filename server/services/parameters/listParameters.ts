import type { Parameter } from '#shared/types/system'
import { ConditionRow } from '../../database/models/ConditionRow'
import { ParameterRow } from '../../database/models/ParameterRow'
import { ParameterValue } from '../../database/models/ParameterValue'

/** The parameters of a system in their order, with their values in the conditions that are not deleted. */
export async function listParameters(systemId: number): Promise<Parameter[]> {
  const rows = await ParameterRow.findAll({ where: { systemId }, order: ['position', 'id'] })
  const conditions = await ConditionRow.findAll({ where: { systemId }, attributes: ['id'] })
  const values = await ParameterValue.findAll({ where: { parameterId: rows.map(row => row.id), conditionId: conditions.map(condition => condition.id) } })
  return rows.map(({ id, version, name, unit, notes, position }) => ({
    id, version, systemId, name, unit, notes, position,
    values: Object.fromEntries(values.filter(value => value.parameterId === id).map(value => [value.conditionId, value.value])),
  }))
}
