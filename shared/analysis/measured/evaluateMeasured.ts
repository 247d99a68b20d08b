import type { MeasuredInput } from '../../types/analysis'
import type { LoopGain } from '../LoopGain'
import { buildMeasuredCurve } from './buildMeasuredCurve'
import { curveAt } from './curveAt'

/**
 * The interpolated loop gain of a measured response, for figures and tables: no value outside its samples. Frequencies in rad/s,
 * whatever unit the input has. Its features are the samples at which the magnitude turns, as wide as the gaps beside them.
 *
 * @throws AnalysisInputError as `buildMeasuredCurve`
 */
export function evaluateMeasured(input: MeasuredInput): LoopGain {
  const curve = buildMeasuredCurve(input)
  const unit = input.frequencyUnit === 'Hz' ? 2 * Math.PI : 1
  const { frequency, gain } = curve
  const last = frequency.length - 1
  const features: LoopGain['features'] = []
  for (let i = 1; i < last; i++) {
    if ((gain[i]! - gain[i - 1]!) * (gain[i + 1]! - gain[i]!) <= 0) {
      features.push({ frequency: frequency[i]! * unit, width: (frequency[i + 1]! - frequency[i - 1]!) / 2 * unit })
    }
  }
  const [start, end] = [frequency[0]! * unit, frequency[last]! * unit]
  return {
    evaluate: (w, out) => {
      // The ends are samples, whichever way the unit rounds.
      const point = curveAt(curve, w === start ? frequency[0]! : w === end ? frequency[last]! : w / unit)
      if (point === null) return false
      const size = Math.exp(point.gain)
      out[0] = size * Math.cos(point.phase)
      out[1] = size * Math.sin(point.phase)
      return true
    },
    axisStart: start,
    axisEnd: end,
    features,
    deadTime: 0,
  }
}
