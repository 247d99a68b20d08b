import { AppError } from '#shared/errors/AppError'
import type { Block } from '#shared/types/block'
import type { Criterion } from '#shared/types/criterion'
import type { Source } from '#shared/types/source'
import type { BoardCell, Loop, OperatingCondition, Parameter, System } from '#shared/types/system'
import { SourceRow } from '../../database/models/SourceRow'
import { presentSource } from '../../presenters/presentSource'
import { presentSystem } from '../../presenters/presentSystem'
import { listBlocks } from '../blocks/listBlocks'
import { listConditions } from '../conditions/listConditions'
import type { OpenContext } from '../context'
import { listCriteria } from '../criteria/listCriteria'
import { listParameters } from '../parameters/listParameters'
import { findSystem } from '../systems/findSystem'
import { judgeCells } from '../systems/judgeCells'
import { findLoop } from './findLoop'
import { listLoops } from './listLoops'

export interface LoopContent {
  loop: Loop
  /** all of the system, in their order */
  loops: Pick<Loop, 'id' | 'code' | 'name'>[]
  system: System
  conditions: OperatingCondition[]
  parameters: Parameter[]
  blocks: Block[]
  criteria: Criterion[]
  /** all of them, also those set aside */
  sources: Source[]
  /** one for each condition, by the source of record */
  cells: BoardCell[]
}

/** A loop with all that its page shows. */
export async function readLoop(loopId: number, context: OpenContext): Promise<LoopContent> {
  const { systemId } = await findLoop(loopId)
  const [systemRow, loops, conditions, parameters, blocks, criteria] = await Promise.all([
    findSystem(systemId), listLoops(systemId), listConditions(systemId), listParameters(systemId), listBlocks(systemId), listCriteria(systemId),
  ])
  const loop = loops.find(({ id }) => id === loopId)
  if (!loop) throw new AppError('notFound', 'There is no such loop.')
  const system = presentSystem(systemRow)
  const conditionIds = conditions.map(condition => condition.id)
  const sources = await SourceRow.findAll({ where: { loopId, conditionId: conditionIds }, order: ['id'] })
  const cells = await judgeCells(system, [loop], conditionIds, criteria, loops, context)
  return { loop, loops: loops.map(({ id, code, name }) => ({ id, code, name })), system, conditions, parameters, blocks, criteria, sources: sources.map(presentSource), cells }
}
