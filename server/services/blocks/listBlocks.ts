import type { Block } from '#shared/types/block'
import { BlockGainRow } from '../../database/models/BlockGainRow'
import { BlockRow } from '../../database/models/BlockRow'
import { ConditionRow } from '../../database/models/ConditionRow'
import { presentBlock } from '../../presenters/presentBlock'

/** The blocks of a system in their order, with their gains in the conditions that are not deleted. */
export async function listBlocks(systemId: number): Promise<Block[]> {
  const rows = await BlockRow.findAll({ where: { systemId }, order: ['position', 'id'] })
  const conditions = await ConditionRow.findAll({ where: { systemId }, attributes: ['id'] })
  const gains = await BlockGainRow.findAll({ where: { blockId: rows.map(row => row.id), conditionId: conditions.map(condition => condition.id) } })
  return rows.map(row => presentBlock(row, gains))
}
