import type { BlockGain } from '#shared/types/block'
import { findCondition } from '../conditions/findCondition'
import { findSystem } from '../systems/findSystem'
import { BlockGains } from './BlockGains'
import { listBlocks } from './listBlocks'

/** By name the gain of every block that has one in an operating condition and can be read: what an editor hands to the engine in the browser. */
export async function readGains(conditionId: number): Promise<Record<string, BlockGain>> {
  const condition = await findCondition(conditionId)
  const [system, blocks] = await Promise.all([findSystem(condition.systemId), listBlocks(condition.systemId)])
  return new BlockGains(blocks, system).allIn(condition)
}
