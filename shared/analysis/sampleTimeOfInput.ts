import type { LoopInput } from '../types/analysis'
import { commonSampleTime } from './blocks/commonSampleTime'
import { orderBlocks } from './blocks/orderBlocks'

/**
 * The sample time (s) of a loop, its own or that of its blocks; undefined for a continuous and for a measured loop, one over a measured block included.
 *
 * @throws AnalysisInputError where its blocks go in a circle or have several sample times
 */
export function sampleTimeOfInput(input: LoopInput): number | undefined {
  if ('measured' in input) return undefined
  if (!('expression' in input) || !input.blocks) return input.sampleTime
  const { blocks } = input
  const needed = orderBlocks(input.expression, blocks)
  if (needed.some(name => blocks[name]!.kind === 'measured')) return undefined
  return commonSampleTime(input.sampleTime, needed, blocks)
}
