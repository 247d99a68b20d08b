import { AppError } from '#shared/errors/AppError'
import type { ParameterEntry } from '#shared/schemas/parameter'
import type { Parameter } from '#shared/types/system'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { BlockRow } from '../../database/models/BlockRow'
import { ConditionRow } from '../../database/models/ConditionRow'
import { ParameterRow } from '../../database/models/ParameterRow'
import { ParameterValue } from '../../database/models/ParameterValue'
import { assertNewest } from '../assertNewest'
import type { ServiceContext } from '../context'
import { listParameters } from './listParameters'

/**
 * Sets the parameters of a system to this list, in its order. Throws 'conflict' where an entry was made from an older version or its
 * parameter is gone, or where there is a parameter that `madeFrom`, the ids the list was made from, does not know. Values in deleted conditions stay, so
 * that a restored condition has them again.
 */
export function replaceParameters(systemId: number, entries: ParameterEntry[], context: ServiceContext, madeFrom?: readonly number[]): Promise<Parameter[]> {
  return writeTransaction(async () => {
    const before = await listParameters(systemId)
    const conditionIds = (await ConditionRow.findAll({ where: { systemId }, attributes: ['id'] })).map(condition => condition.id)
    assertConditionsKnown(entries, conditionIds)
    await assertNoBlockNamed(systemId, entries)
    const added = madeFrom && before.find(parameter => !madeFrom.includes(parameter.id))
    if (added) throw new AppError('conflict', `Somebody else has added the parameter ${added.name} in the meantime.`, { path: 'madeFrom', details: { current: before } })
    const kept = new Set(entries.flatMap(entry => entry.id ?? []))
    await ParameterRow.destroy({ where: { systemId, id: before.map(parameter => parameter.id).filter(id => !kept.has(id)) } })
    for (const [index, entry] of entries.entries()) {
      const parameterId = await storeEntry(systemId, entry, index, before)
      await ParameterValue.destroy({ where: { parameterId, conditionId: conditionIds } })
      await ParameterValue.bulkCreate(Object.entries(entry.values).map(([conditionId, value]) => ({ parameterId, conditionId: Number(conditionId), value })))
    }
    const after = await listParameters(systemId)
    await recordAudit(context, 'parameters changed', { systemId, payload: { before, after } })
    return after
  })
}

function assertConditionsKnown(entries: ParameterEntry[], conditionIds: number[]): void {
  for (const [index, { name, values }] of entries.entries()) {
    const stray = Object.keys(values).find(id => !conditionIds.includes(Number(id)))
    if (stray !== undefined) throw new AppError('invalidInput', `The parameter ${name} has a value in a condition that is not of this system.`, { path: `parameters[${index}].values.${stray}` })
  }
}

/** An expression could not tell a parameter from a block of the same name. */
async function assertNoBlockNamed(systemId: number, entries: ParameterEntry[]): Promise<void> {
  const blocks = new Set((await BlockRow.findAll({ where: { systemId }, attributes: ['name'] })).map(block => block.name))
  const index = entries.findIndex(({ name }) => blocks.has(name))
  if (index >= 0) throw new AppError('invalidInput', `This system has a block with the name ${entries[index]?.name}.`, { path: `parameters[${index}].name` })
}

/** Stores one entry without its values; returns the parameter's id. */
async function storeEntry(systemId: number, entry: ParameterEntry, index: number, before: Parameter[]): Promise<number> {
  const { name, unit, notes } = entry
  const fields = { systemId, name, unit, notes, position: index + 1 }
  if (entry.id === undefined) return (await ParameterRow.create({ ...fields, version: 1 })).id
  const former = before.find(parameter => parameter.id === entry.id)
  if (!former) throw new AppError('conflict', `The parameter ${name} has been removed in the meantime.`, { path: `parameters[${index}]`, details: { current: before } })
  assertNewest(former, entry.version ?? former.version, before)
  await ParameterRow.update({ ...fields, version: former.version + 1 }, { where: { id: entry.id } })
  return entry.id
}
