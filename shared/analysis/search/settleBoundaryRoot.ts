import type { AxisLoop } from './AxisLoop'
import { AXIS_VALUE_SIZE, evaluateAxisLoop } from './evaluateAxisLoop'
import { LogSeries, SERIES_DEGREE } from './LogSeries'

const N = SERIES_DEGREE
const TWO_PI = 2 * Math.PI
const MAX_TRIES = 100

/** What was shown about an undamped pole or zero at jv: nothing is found within `half` of it. */
export interface SettledBoundaryRoot {
  v: number
  weight: number
  half: number
  /** Limits of arg L from below and from above, rad in (-pi, pi]. */
  phaseBelow: number
  phaseAbove: number
  /** Slope of the phase at either side; its sign decides where a limit is exactly 180 deg. */
  phaseSlope: number
  /** A limit that is 180 deg for all one can tell. */
  realLimit: boolean
  /** Greatest ln|L| within `half` of a zero; Infinity for a pole. */
  skippedBelow: number
  settled: boolean
}

/**
 * Shrinks a region about an undamped pole or zero until it holds no find. With that factor taken out, the rest has a
 * Taylor series about the root: ln|L| = weight ln|y| + series is monotone on either side where |weight| > sum n|re_n| + bound.
 */
export function settleBoundaryRoot(axis: AxisLoop, v: number, weight: number, floorLog: number, searchesPhase: boolean): SettledBoundaryRoot {
  const log = new LogSeries()
  const value = new Float64Array(AXIS_VALUE_SIZE)
  let half = v
  for (let k = 0; k < axis.count; k++) {
    if (axis.re[k] === 0 && axis.im[k] === v) continue
    half = Math.min(half, Math.hypot(axis.re[k]!, axis.im[k]! - v))
  }
  half *= 0.4
  if (axis.deadTime > 0) half = Math.min(half, 0.4 / axis.deadTime)
  const result: SettledBoundaryRoot = {
    v, weight, half, phaseBelow: 0, phaseAbove: 0, phaseSlope: 0, realLimit: false, skippedBelow: Number.POSITIVE_INFINITY, settled: false,
  }
  for (let i = 0; i < MAX_TRIES; i++, half *= 0.4) {
    // The edges as doubles, and the region laid to hold both.
    const below = v - half
    const above = v + half
    if (!(below < v && above > v)) break
    log.expandAbout(axis, v, half * (1 + 1e-12), v)
    result.half = half
    let oddIm = 0
    let evenIm = 0
    let sumRe = 0
    let sumIm = 0
    let restIm = 0
    for (let n = 1; n <= N; n++) {
      if (n % 2 === 0) evenIm += log.im[n]!
      else oddIm += log.im[n]!
      sumRe += n * Math.abs(log.re[n]!)
      sumIm += n * Math.abs(log.im[n]!)
      if (n > 1) restIm += Math.abs(log.im[n]!)
    }
    const bound0 = log.steady[0]! + log.tail[0]!
    const bound1 = log.steady[1]! + log.tail[1]!
    evaluateAxisLoop(axis, below, value)
    const gainBelow = value[0]!
    result.phaseBelow = wrap(value[1]! - (evenIm - oddIm))
    evaluateAxisLoop(axis, above, value)
    const gainAbove = value[0]!
    result.phaseAbove = wrap(value[1]! - (evenIm + oddIm))
    const least = Math.min(gainBelow, gainAbove) - 1e-12 - bound0
    const greatest = Math.max(gainBelow, gainAbove) + 1e-12 + bound0
    if (Math.abs(weight) <= sumRe + bound1) continue
    result.phaseSlope = Math.abs(log.im[1]!) > bound1 ? Math.sign(log.im[1]!) : 0
    if (weight > 0) {
      result.skippedBelow = greatest
      // Clear of the floor, so that the box beside the region soon is under it too.
      result.settled = greatest < Math.min(0, floorLog) - 0.1
      if (result.settled) break
      continue
    }
    if (!(least > 0) || !((-weight - sumRe - bound1) * Math.expm1(least) > sumIm + bound1)) continue
    const clearBelow = Math.abs(wrap(result.phaseBelow - Math.PI))
    const clearAbove = Math.abs(wrap(result.phaseAbove - Math.PI))
    const limitError = bound0 + 1e-14
    const clear = Math.min(clearBelow, clearAbove)
    if (!searchesPhase || clear > log.spreadIm + limitError) {
      result.settled = true
      break
    }
    // Within rounding, not within what the series leaves out: a limit beside 180 deg has a crossing near by.
    if (clear <= limitError && log.tail[0]! <= log.steady[0]! && Math.abs(log.im[1]!) > restIm + bound1) {
      result.realLimit = true
      result.settled = true
      break
    }
  }
  return result
}

function wrap(angle: number): number {
  return angle - TWO_PI * Math.round(angle / TWO_PI)
}
