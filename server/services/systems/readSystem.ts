import type { Block } from '#shared/types/block'
import type { Criterion } from '#shared/types/criterion'
import type { Loop, OperatingCondition, System } from '#shared/types/system'
import { ReportRow } from '../../database/models/ReportRow'
import { presentSystem } from '../../presenters/presentSystem'
import { listBlocks } from '../blocks/listBlocks'
import { listConditions } from '../conditions/listConditions'
import { listCriteria } from '../criteria/listCriteria'
import { listLoops } from '../loops/listLoops'
import { findSystem } from './findSystem'

export interface SystemContent {
  system: System
  loops: Loop[]
  conditions: OperatingCondition[]
  blocks: Block[]
  criteria: Criterion[]
  reportCount: number
}

/** A system with its loops, conditions and blocks in their order. */
export async function readSystem(systemId: number): Promise<SystemContent> {
  const [system, loops, conditions, blocks, criteria, reportCount] = await Promise.all([
    findSystem(systemId), listLoops(systemId), listConditions(systemId), listBlocks(systemId), listCriteria(systemId), ReportRow.count({ where: { systemId } }),
  ])
  return { system: presentSystem(system), loops, conditions, blocks, criteria, reportCount }
}
