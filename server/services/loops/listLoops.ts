import type { Loop } from '#shared/types/system'
import { LoopRow } from '../../database/models/LoopRow'
import { presentLoop } from '../../presenters/presentLoop'

/** The loops of a system in their order; the states they name are of loops that are not deleted. */
export async function listLoops(systemId: number): Promise<Loop[]> {
  const loops = (await LoopRow.findAll({ where: { systemId }, order: ['position', 'id'] })).map(presentLoop)
  const ids = new Set(loops.map(loop => loop.id))
  return loops.map(loop => ({ ...loop, loopStates: loop.loopStates.filter(state => ids.has(state.loopId)) }))
}
