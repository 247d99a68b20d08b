import { AxisSearch } from '../search/AxisSearch'
import { AXIS_VALUE_SIZE, IM, LOG_GAIN, RE, evaluateAxisLoop } from '../search/evaluateAxisLoop'
import type { SearchResult } from '../search/searchLoop'
import { leastOnStretch } from './leastOnStretch'
import { listStretches } from './listStretches'

/** No stretch is searched for a peak higher than the best by less than this part. */
const RESOLUTION = 1e-10

/** The peak of |T| = |L/(1 + L)| and where: 1/min |1 + 1/L|. */
export interface ComplementaryPeak { peak: number, v: number }

/**
 * The greatest |T| over from <= v <= to, by the same search for minima as for |1 + L|, of |1 + 1/L|. With m = ln|L|,
 * |1 + 1/L| >= |1 - exp(-m)|, so only the stretches where that is not above the least found so far are searched.
 * What it cannot decide (a peak at the very joint of two stretches) is covered by the values at the joints, and beside the ends, where L nears its
 * limit smoothly, golden section takes its place: the peak is searched with the proven boxes, but not proven itself.
 */
export function findComplementaryPeak(result: SearchResult, from: number, to: number): ComplementaryPeak {
  const { axis, gain, distance, origin, infinity } = result
  const best = { inverse: Number.POSITIVE_INFINITY, v: Number.NaN }
  const value = new Float64Array(AXIS_VALUE_SIZE)
  const offer = (inverse: number, v: number) => {
    if (inverse < best.inverse) {
      best.inverse = inverse
      best.v = v
    }
  }
  const offerFind = (logGain: number, phase: number, v: number) => {
    if (v < from || v > to) return
    const inverse = Math.exp(-logGain)
    offer(Math.hypot(1 + inverse * Math.cos(phase), inverse * Math.sin(phase)), v)
  }
  const offerAt = (v: number) => {
    evaluateAxisLoop(axis, v, value)
    if (value[LOG_GAIN]! > -300 && value[LOG_GAIN]! < 300) offer(Math.hypot(1 + value[RE]!, value[IM]!) / Math.exp(value[LOG_GAIN]!), v)
  }
  for (const [end, v, inside] of [[origin, 0, from === 0], [infinity, Number.POSITIVE_INFINITY, to === Number.POSITIVE_INFINITY]] as const) {
    if (!inside) continue
    if (v > 0 && axis.deadTime > 0 && axis.degree === 0) offer(Math.abs(Math.expm1(-end.logGain)), v)
    else if (end.logGain === Number.POSITIVE_INFINITY) offer(1, v)
    else if (Number.isFinite(end.logGain)) offer(Math.hypot(1 + end.re, end.im) / Math.exp(end.logGain), v)
  }
  for (const root of result.boundary) {
    if (root.weight < 0 && root.v >= from && root.v <= to) offer(1, root.v)
  }
  if (from > 0) offerAt(from)
  if (Number.isFinite(to)) offerAt(to)
  for (const finds of [gain, distance]) {
    for (let i = 0; i < finds.v.length; i++) offerFind(finds.logGain[i]!, finds.phase[i]!, finds.v[i]!)
  }
  const again = new AxisSearch(axis)
  const inverseAt = (v: number) => {
    evaluateAxisLoop(axis, v, value)
    return Math.hypot(1 + value[RE]!, value[IM]!) / Math.exp(value[LOG_GAIN]!)
  }
  for (const { from: start, to: stop, least, outer } of listStretches(result, from, to)) {
    const bound = least > 0 ? -Math.expm1(-least) : Math.expm1(-least)
    if (bound >= best.inverse * (1 - RESOLUTION)) continue
    if (outer) {
      const low = leastOnStretch(inverseAt, start, stop)
      offer(low.value, low.v)
      offer(inverseAt(start), start)
      offer(inverseAt(stop), stop)
      continue
    }
    again.leastInverse = best.inverse
    const mark = again.inverseDistance.v.length
    offerAt(start)
    offerAt(stop)
    again.search(start, stop, {
      gain: false, phase: false, distance: false, inverseDistance: true,
      floorLog: Number.NEGATIVE_INFINITY, stopAt: Number.POSITIVE_INFINITY, maxFinds: Number.POSITIVE_INFINITY, maxEffort: 1e6,
    })
    for (let k = mark; k < again.inverseDistance.v.length; k++) {
      offerFind(again.inverseDistance.logGain[k]!, again.inverseDistance.phase[k]!, again.inverseDistance.v[k]!)
    }
  }
  return { peak: best.inverse === Number.POSITIVE_INFINITY ? 0 : 1 / best.inverse, v: best.v }
}
