import type { LoopGain } from '../../analysis/LoopGain'
import type { FrequencyRange } from './chooseFrequencyRange'
import { roundDown, roundUp } from './roundFrequency'

/** Most decades shown where nothing but features asks for them. */
const usualDecades = 4

/**
 * The range of frequency (in the unit that is `unit` rad/s) in which a gain does something: its features with a decade on either side, at most four
 * decades about their middle; from 0.1 to 10 rad/s about where there are none.
 */
export function rangeOfFeatures(gain: LoopGain, unit: number): FrequencyRange {
  const axisEnd = gain.axisEnd / unit
  const features = gain.features.map(feature => feature.frequency / unit).filter(frequency => frequency > 0 && frequency <= axisEnd)
  const middle = features.length > 0 ? features.reduce((sum, f) => sum + Math.log(f), 0) / features.length : Number.isFinite(axisEnd) ? Math.log(axisEnd / 30) : 0
  const reach = 10 ** (usualDecades / 2)
  const centre = Math.exp(middle)
  const low = roundDown(Math.max(Math.min(...features, centre) / 10, centre / reach))
  const high = roundUp(Math.min(Math.max(...features, centre) * 10, centre * reach))
  return { from: Math.max(low, gain.axisStart / unit), to: Math.min(high, axisEnd) }
}
