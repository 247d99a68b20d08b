import { wrapDegrees } from '../sampling/wrapDegrees'
import type { SampledCurve } from '../FigureData'

/** deg */
const tieTowardsLag = 10

/** A sampled loop gain in the quantities that are drawn over frequency; NaN where the line is broken. */
export interface CurveViews {
  /** dB */
  gain: Float64Array
  /** deg, unwrapped; see `unwrappedPhase` */
  phase: Float64Array
  /** |1 + L| */
  distance: Float64Array
}

/** Gain, unwrapped phase and return difference of each sample. */
export function curveViews({ re, im, frequency }: SampledCurve): CurveViews {
  const gain = new Float64Array(re.length)
  const distance = new Float64Array(re.length)
  for (let i = 0; i < re.length; i++) {
    gain[i] = 20 * Math.log10(Math.hypot(re[i]!, im[i]!))
    distance[i] = Math.hypot(1 + re[i]!, im[i]!)
  }
  return { gain, distance, phase: unwrappedPhase(re, im, gain, frequency) }
}

/**
 * Phase in degrees, continuous along the curve. The whole turn it starts on is the one that a loop of that slope without unstable roots has:
 * an integrator starts at -90, a triple one at -270, a differentiator at +90. Across a break at a pole on the boundary the phase falls by up to half a
 * turn, as it does past a lightly damped one; across a zero it rises.
 */
function unwrappedPhase(re: Float64Array, im: Float64Array, gain: Float64Array, frequency: Float64Array): Float64Array {
  const phase = new Float64Array(re.length)
  let last = Number.NaN
  let broken = false
  for (let i = 0; i < re.length; i++) {
    if (Number.isNaN(re[i]!)) {
      phase[i] = Number.NaN
      broken = true
      continue
    }
    const argument = Math.atan2(im[i]!, re[i]!) * 180 / Math.PI
    if (Number.isNaN(last)) {
      const next = i + 1 < re.length && !Number.isNaN(re[i + 1]!) ? i + 1 : i
      const slope = next > i ? (gain[next]! - gain[i]!) / (20 * Math.log10(frequency[next]! / frequency[i]!)) : 0
      // Half a turn of lag and half a turn of lead are nearly a tie, which goes to lag.
      const usual = 90 * slope - tieTowardsLag
      phase[i] = argument + 360 * Math.round((usual - argument) / 360)
    }
    else {
      let step = wrapDegrees(argument - last)
      if (broken) {
        if (gain[i]! > 0 && step > 90) step -= 360
        if (gain[i]! < 0 && step < -90) step += 360
      }
      phase[i] = last + step
    }
    last = phase[i]!
    broken = false
  }
  return phase
}
