import type { LoopGain } from '../analysis/LoopGain'
import type { FrequencyUnit } from '../types/analysis'
import type { BlockResponseData } from './FigureData'
import { rangeOfFeatures } from './sampling/rangeOfFeatures'
import { sampleLoopGain } from './sampling/sampleLoopGain'

export interface BlockResponseSource {
  /** as in 'G[rate, torque]' */
  title: string
  frequencyUnit: FrequencyUnit
  gain: LoopGain
  /** Measured: the frequencies of the samples, in the unit. */
  sampleFrequencies?: ArrayLike<number>
  /** s; of a sampled block */
  sampleTime?: number
}

/** The response of a block, sampled over the range in which it does something. */
export function buildBlockResponse({ title, frequencyUnit, gain, sampleFrequencies, sampleTime }: BlockResponseSource): BlockResponseData {
  const unit = frequencyUnit === 'Hz' ? 2 * Math.PI : 1
  const isMeasured = gain.axisStart > 0 && Number.isFinite(gain.axisEnd)
  const range = isMeasured ? { from: gain.axisStart / unit, to: gain.axisEnd / unit } : rangeOfFeatures(gain, unit)
  const { frequency, re, im } = sampleLoopGain(gain, { from: range.from * unit, to: range.to * unit, seeds: Array.from(sampleFrequencies ?? [], value => value * unit) })
  const out = new Float64Array(2)
  return {
    title, frequencyUnit, range,
    response: { frequency: frequency.map(w => w / unit), re, im },
    ...sampleFrequencies !== undefined && {
      samples: Array.from(sampleFrequencies).flatMap(frequency => gain.evaluate(frequency * unit, out) ? [{ frequency, re: out[0]!, im: out[1]! }] : []),
    },
    ...sampleTime !== undefined && { halfSampleRate: Math.PI / sampleTime / unit },
  }
}
