import type { BlockDefinition } from '#shared/types/block'
import { BlockGainRow } from '../../database/models/BlockGainRow'
import { ConditionRow } from '../../database/models/ConditionRow'

/** The upload a definition reads, null for one that reads none. */
export const uploadOf = (definition: BlockDefinition | null): number | null => definition && 'uploadId' in definition ? definition.uploadId : null

/** Sets the gains of a block in single conditions. Those in deleted conditions stay, so that a restored condition has them again. */
export async function storeGains(block: { id: number, systemId: number }, byCondition: Record<number, BlockDefinition>): Promise<void> {
  const conditions = await ConditionRow.findAll({ where: { systemId: block.systemId }, attributes: ['id'] })
  await BlockGainRow.destroy({ where: { blockId: block.id, conditionId: conditions.map(condition => condition.id) } })
  await BlockGainRow.bulkCreate(Object.entries(byCondition).map(([conditionId, definition]) => ({ blockId: block.id, conditionId: Number(conditionId), definition, uploadId: uploadOf(definition) })))
}
