import type { Loop } from '#shared/types/system'
import { LoopRow } from '../../database/models/LoopRow'
import { presentLoop } from '../../presenters/presentLoop'

/** The loops of a system in their order. */
export async function listLoops(systemId: number): Promise<Loop[]> {
  return (await LoopRow.findAll({ where: { systemId }, order: ['position', 'id'] })).map(presentLoop)
}
