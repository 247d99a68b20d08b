import type { BlockGain } from '../../types/block'
import { AnalysisInputError } from '../AnalysisInputError'
import { sameSampleTime } from './sameSampleTime'

/**
 * The one sample time of a loop (s) over the blocks that it needs; undefined for a loop without sampled blocks and holds.
 *
 * @param own sample time of the loop's own expression
 * @throws AnalysisInputError where two differ: several rates in one loop are never taken at one
 */
export function commonSampleTime(own: number | undefined, needed: readonly string[], blocks: Readonly<Record<string, BlockGain>>): number | undefined {
  let found = own
  let holder = 'the loop'
  for (const name of needed) {
    const gain = blocks[name]!
    if (!('sampleTime' in gain) || gain.sampleTime === undefined) continue
    if (found === undefined) [found, holder] = [gain.sampleTime, `the block ${name}`]
    else if (!sameSampleTime(found, gain.sampleTime)) {
      throw new AnalysisInputError(
        `Two rates in one loop: ${holder} is sampled every ${found} s, the block ${name} every ${gain.sampleTime} s. A loop is analysed at one rate: bring all its sampled parts to it, or break the system where the loop has one rate.`, `blocks.${name}.sampleTime`)
    }
  }
  return found
}
