import type { Block } from '#shared/types/block'
import { BlockGainRow } from '../../database/models/BlockGainRow'
import type { BlockRow } from '../../database/models/BlockRow'
import { ConditionRow } from '../../database/models/ConditionRow'
import { presentBlock } from '../../presenters/presentBlock'

/** A block with its gains in the conditions that are not deleted. */
export async function readBlock(block: BlockRow): Promise<Block> {
  const conditions = await ConditionRow.findAll({ where: { systemId: block.systemId }, attributes: ['id'] })
  const gains = await BlockGainRow.findAll({ where: { blockId: block.id, conditionId: conditions.map(condition => condition.id) } })
  return presentBlock(block, gains)
}
