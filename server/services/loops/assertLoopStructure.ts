import { AppError } from '#shared/errors/AppError'
import type { BreakAt, OtherLoopState } from '#shared/types/system'
import { BlockRow } from '../../database/models/BlockRow'
import { LoopRow } from '../../database/models/LoopRow'

/**
 * Refuses a break point at a block that the system has not, and the state of a loop that is not another loop of it. A deleted loop may keep its
 * state, so that it has it again when it is restored. `loopId`: the loop itself, null while it is new.
 */
export async function assertLoopStructure(systemId: number, loopId: number | null, { breakAt, loopStates }: { breakAt?: BreakAt | null, loopStates?: OtherLoopState[] }): Promise<void> {
  if (breakAt && await BlockRow.count({ where: { systemId, name: breakAt.block } }) === 0) {
    throw new AppError('invalidInput', `This system has no block ${breakAt.block}.`, { path: 'breakAt.block' })
  }
  if (!loopStates || loopStates.length === 0) return
  const known = new Set((await LoopRow.unscoped().findAll({ where: { systemId }, attributes: ['id'] })).map(loop => loop.id))
  for (const [index, state] of loopStates.entries()) {
    if (state.loopId === loopId) throw new AppError('invalidInput', 'A loop is open at its own break point: only the others have a state.', { path: `loopStates[${index}].loopId` })
    if (!known.has(state.loopId)) throw new AppError('invalidInput', 'There is no such loop in this system.', { path: `loopStates[${index}].loopId` })
  }
}
