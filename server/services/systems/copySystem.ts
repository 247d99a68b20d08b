import type { System } from '#shared/types/system'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { ConditionRow } from '../../database/models/ConditionRow'
import { CriterionRow } from '../../database/models/CriterionRow'
import { LoopRow } from '../../database/models/LoopRow'
import { MembershipRow } from '../../database/models/MembershipRow'
import { ParameterRow } from '../../database/models/ParameterRow'
import { ParameterValue } from '../../database/models/ParameterValue'
import { SourceRow } from '../../database/models/SourceRow'
import { SystemRow } from '../../database/models/SystemRow'
import { presentSystem } from '../../presenters/presentSystem'
import { nowOf, type ServiceContext } from '../context'
import { copyBlocks } from '../blocks/copyBlocks'
import { copySources } from '../sources/copySources'
import { copyUpload } from '../uploads/copyUpload'
import { findSystem } from './findSystem'

/**
 * Copies a whole system under a new name: loops, conditions, parameters, blocks, criteria and sources with their uploads; no reports and
 * no members but the one who copies, who becomes its engineer.
 */
export function copySystem(systemId: number, name: string, context: ServiceContext): Promise<System> {
  return writeTransaction(async () => {
    const original = await findSystem(systemId)
    const { customer, documentNumber, frequencyUnit, description } = original
    const copy = await SystemRow.create({ name, customer, documentNumber, frequencyUnit, description, version: 1, createdAt: nowOf(context) })
    await MembershipRow.create({ personId: context.actor.id, systemId: copy.id, role: 'engineer' })
    const criteria = await CriterionRow.findAll({ where: { systemId } })
    await CriterionRow.bulkCreate(criteria.map(({ quantity, limitValue }) => ({ systemId: copy.id, quantity, limitValue })))
    const loops = await copyLoops(systemId, copy.id, context)
    const conditions = await copyConditions(systemId, copy.id, context)
    await copyParameters(systemId, copy.id, conditions)
    const uploads: Twins = new Map()
    const uploadOf = async (uploadId: number): Promise<number> => {
      const twin = uploads.get(uploadId) ?? await copyUpload(uploadId, copy.id, context)
      uploads.set(uploadId, twin)
      return twin
    }
    await copyBlocks(systemId, { systemId: copy.id, conditionOf: id => conditions.get(id), uploadOf }, context)
    await copySourcesOf(loops, conditions, uploadOf, context)
    await recordAudit(context, 'system copied', { systemId: copy.id, subjectId: copy.id, payload: { from: systemId, name } })
    return presentSystem(copy)
  })
}

/** The new id of each old one. */
type Twins = Map<number, number>

async function copyLoops(systemId: number, copyId: number, context: ServiceContext): Promise<Twins> {
  const twins: Twins = new Map()
  const copies: LoopRow[] = []
  for (const loop of await LoopRow.findAll({ where: { systemId }, order: ['position', 'id'] })) {
    const { code, name, axis, breakPoint, otherLoops, breakAt, loopStates, notes, position } = loop
    const copy = await LoopRow.create({ systemId: copyId, code, name, axis, breakPoint, otherLoops, breakAt, loopStates, notes, position, version: 1, createdAt: nowOf(context) })
    copies.push(copy)
    twins.set(loop.id, copy.id)
  }
  for (const copy of copies) {
    await copy.update({ loopStates: copy.loopStates.flatMap(state => twins.has(state.loopId) ? [{ ...state, loopId: twins.get(state.loopId) ?? 0 }] : []) })
  }
  return twins
}

async function copyConditions(systemId: number, copyId: number, context: ServiceContext): Promise<Twins> {
  const twins: Twins = new Map()
  for (const condition of await ConditionRow.findAll({ where: { systemId }, order: ['position', 'id'] })) {
    const { code, name, coordinates, tags, notes, position } = condition
    twins.set(condition.id, (await ConditionRow.create({ systemId: copyId, code, name, coordinates, tags, notes, position, version: 1, createdAt: nowOf(context) })).id)
  }
  return twins
}

async function copyParameters(systemId: number, copyId: number, conditions: Twins): Promise<void> {
  for (const parameter of await ParameterRow.findAll({ where: { systemId }, order: ['position', 'id'] })) {
    const { name, unit, notes, position } = parameter
    const twin = await ParameterRow.create({ systemId: copyId, name, unit, notes, position, version: 1 })
    const values = await ParameterValue.findAll({ where: { parameterId: parameter.id } })
    await ParameterValue.bulkCreate(values.flatMap(({ conditionId, value }) => {
      const condition = conditions.get(conditionId)
      return condition === undefined ? [] : [{ parameterId: twin.id, conditionId: condition, value }]
    }))
  }
}

async function copySourcesOf(loops: Twins, conditions: Twins, uploadOf: (uploadId: number) => Promise<number>, context: ServiceContext): Promise<void> {
  const where = { loopId: [...loops.keys()], conditionId: [...conditions.keys()] }
  const uploads: Twins = new Map()
  for (const source of await SourceRow.findAll({ where })) {
    if (source.uploadId !== null && !uploads.has(source.uploadId)) uploads.set(source.uploadId, await uploadOf(source.uploadId))
  }
  await copySources(where, (source) => {
    const loopId = loops.get(source.loopId)
    const conditionId = conditions.get(source.conditionId)
    if (loopId === undefined || conditionId === undefined) return null
    return { loopId, conditionId, ...(source.uploadId !== null && { uploadId: uploads.get(source.uploadId) }) }
  }, context)
}
