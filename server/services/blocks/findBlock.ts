import { AppError } from '#shared/errors/AppError'
import { BlockRow } from '../../database/models/BlockRow'

/** A block by id; throws 'not found'. */
export async function findBlock(blockId: number): Promise<BlockRow> {
  const block = await BlockRow.findByPk(blockId)
  if (block === null) throw new AppError('notFound', 'There is no such block.')
  return block
}
