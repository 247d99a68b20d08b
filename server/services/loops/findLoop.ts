import { AppError } from '#shared/errors/AppError'
import { LoopRow } from '../../database/models/LoopRow'

/** A loop by id; throws 'not found'. */
export async function findLoop(loopId: number): Promise<LoopRow> {
  const loop = await LoopRow.findByPk(loopId)
  if (loop === null) throw new AppError('notFound', 'There is no such loop.')
  return loop
}
