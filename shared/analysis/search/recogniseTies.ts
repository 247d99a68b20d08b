import type { AxisLoop } from './AxisLoop'
import { AXIS_VALUE_SIZE, LOG_GAIN, LOG_GAIN_SLOPE, PHASE, PHASE_SLOPE, evaluateAxisLoop } from './evaluateAxisLoop'

/** What is the same over whole stretches of the axis, told from the places of the roots before any search. */
export interface AxisTies {
  /** |L| is the same everywhere: every root has its mirror image of the other kind (all-pass). */
  constantGain: boolean
  /** L is real everywhere: every root has its mirror image of the same kind, or lies on the axis, and there is no dead time. */
  real: boolean
  /** |1 + L| is the same everywhere: it has no minima, only its one value. */
  constantDistance: boolean
}

/** Roots count as mirror images when they differ by less than this part of their distance from the axis. */
const MIRROR = 1e-11

export function recogniseTies(axis: AxisLoop): AxisTies {
  if (axis.extension) return { constantGain: false, real: false, constantDistance: false }
  let constantGain = axis.originWeight === 0 && axis.boundary.length === 0
  // An odd number of integrators or differentiators makes it imaginary instead.
  let real = axis.deadTime === 0 && axis.delayInSamples === 0 && axis.originWeight % 2 === 0
  const done = new Uint8Array(axis.count)
  for (let k = 0; k < axis.count && (constantGain || real); k++) {
    if (done[k] === 1) continue
    const a = Math.abs(axis.re[k]!)
    if (a === 0) continue
    let gain = 0
    let turn = 0
    for (let i = k; i < axis.count; i++) {
      if (Math.abs(Math.abs(axis.re[i]!) - a) > MIRROR * a || Math.abs(axis.im[i]! - axis.im[k]!) > MIRROR * a) continue
      done[i] = 1
      gain += axis.weight[i]!
      turn += axis.weight[i]! * Math.sign(axis.re[i]!)
    }
    // Rounding of fractional weights; whole ones are exact.
    if (Math.abs(gain) > 1e-12) constantGain = false
    if (Math.abs(turn) > 1e-12) real = false
  }
  return { constantGain, real, constantDistance: !(constantGain && real) && hasConstantDistance(axis) }
}

/**
 * |1 + L|^2 less a constant has at most as many zeros in v^2 as L has roots; a slope of zero to within rounding at more places than
 * that is a slope of zero everywhere, to within rounding. Nearly every loop fails the first place.
 */
function hasConstantDistance(axis: AxisLoop): boolean {
  if (axis.deadTime > 0 || axis.delayInSamples !== Math.round(axis.delayInSamples)) return false
  const value = new Float64Array(AXIS_VALUE_SIZE)
  const places = 2 * (axis.count + Math.abs(axis.originWeight) + Math.ceil(axis.delayInSamples)) + 3
  const low = Math.log(0.3 * axis.smallestRoot)
  const high = Math.log(3 * axis.largestRoot)
  const tolerance = 64 * 2 ** -53 * (axis.count + 4)
  for (let i = 0; i < places; i++) {
    // The middle first, then outwards by the golden section, so that no two places meet.
    const part = (0.5 + i * 0.6180339887498949) % 1
    evaluateAxisLoop(axis, Math.exp(low + part * (high - low)), value)
    const gain = Math.exp(value[LOG_GAIN]!)
    const slope = value[LOG_GAIN_SLOPE]! * (gain + Math.cos(value[PHASE]!)) - value[PHASE_SLOPE]! * Math.sin(value[PHASE]!)
    const size = (Math.abs(value[LOG_GAIN_SLOPE]!) + Math.abs(value[PHASE_SLOPE]!)) * (gain + 1)
    if (Math.abs(slope) > tolerance * size) return false
  }
  return true
}
