import { AxisSearch } from '../search/AxisSearch'
import { AXIS_VALUE_SIZE, IM, LOG_GAIN, RE, evaluateAxisLoop } from '../search/evaluateAxisLoop'
import type { SearchResult } from '../search/searchLoop'

/** The peak of |T| = |L/(1 + L)| and where: 1/min |1 + 1/L|. */
export interface ComplementaryPeak { peak: number, v: number }

/**
 * The greatest |T| over from <= v <= to, by the same proven search for minima, of |1 + 1/L|. With m = ln|L|,
 * |1 + 1/L| >= |1 - exp(-m)|, so only the boxes where that is not above the least found so far are searched.
 */
export function findComplementaryPeak(result: SearchResult, from: number, to: number): ComplementaryPeak {
  const { axis, search, gain, distance, origin, infinity } = result
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
    if (end.logGain === Number.POSITIVE_INFINITY) offer(1, v)
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
  const searchStretch = (start: number, stop: number) => {
    if (!(start < stop)) return
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
  const { laid } = search
  for (let i = 0; i < laid.from.length; i++) {
    const least = Math.abs(laid.logGain[i]!) - laid.spread[i]!
    const bound = least <= 0 ? 0 : laid.logGain[i]! > 0 ? -Math.expm1(-least) : Math.expm1(least)
    if (bound > best.inverse || laid.to[i]! < from || laid.from[i]! > to) continue
    searchStretch(Math.max(from, laid.from[i]!), Math.min(to, laid.to[i]!))
  }
  for (const stretch of settledStretches(result)) {
    const least = stretch.logGain === Number.POSITIVE_INFINITY ? 0 : Math.abs(stretch.logGain)
    const bound = stretch.logGain > 0 ? -Math.expm1(-least) : Math.expm1(least)
    if (bound < best.inverse) searchStretch(Math.max(from, stretch.from), Math.min(to, stretch.to))
  }
  return { peak: best.inverse === Number.POSITIVE_INFINITY ? 0 : 1 / best.inverse, v: best.v }
}

/** How near the ends and undamped roots are searched: relative to the settled region there, for a T that no longer changes by 1e-13. */
const NEAR_END = 1e-7
/** 1/|L| beside a pole on the boundary that moves |T| = 1 no more. */
const LEAST_INVERSE_GAIN = 1e-10

/**
 * The stretches beside ends and undamped roots that the main search settled without boxes: what was shown there is of |1 + L|, not of |1 + 1/L|.
 * `logGain`: a bound of ln|L|, least where it is above 0 (|L| grows monotonely towards a pole), greatest where it is below; 0 none.
 */
function settledStretches({ axis, origin, infinity, boundary, endless }: SearchResult): { from: number, to: number, logGain: number }[] {
  const value = new Float64Array(AXIS_VALUE_SIZE)
  const gainAt = (v: number) => {
    evaluateAxisLoop(axis, v, value)
    return value[LOG_GAIN]!
  }
  /** Share of the region beside a pole beyond which 1/|L| is below the least that counts. */
  const depth = (edge: number, order: number) => Math.max(1e-30, Math.min(0.5, Math.exp((gainAt(edge) + Math.log(LEAST_INVERSE_GAIN)) / order)))
  const stretches: { from: number, to: number, logGain: number }[] = []
  if (origin.edge > 0 && origin.logGain !== Number.NEGATIVE_INFINITY) {
    const pole = origin.logGain === Number.POSITIVE_INFINITY
    const share = pole ? depth(origin.edge, Math.max(1, -axis.originWeight)) : NEAR_END
    stretches.push({ from: origin.edge * share, to: origin.edge, logGain: pole ? Math.max(0, gainAt(origin.edge)) : 0 })
  }
  if (Number.isFinite(infinity.edge) && infinity.logGain !== Number.NEGATIVE_INFINITY && !endless) {
    const pole = infinity.logGain === Number.POSITIVE_INFINITY
    const share = pole ? depth(infinity.edge, Math.max(1, axis.degree)) : NEAR_END
    stretches.push({ from: infinity.edge, to: infinity.edge / share, logGain: pole ? Math.max(0, gainAt(infinity.edge)) : 0 })
  }
  for (const { v, weight, half, skippedBelow } of boundary) {
    const pole = weight < 0
    const least = Math.min(gainAt(v - half), gainAt(v + half))
    const share = pole ? depth(v + half, -weight) : NEAR_END
    const inner = Math.max(half * share, 8 * 2 ** -52 * v)
    const logGain = pole ? Math.max(0, least) : Math.min(0, skippedBelow)
    stretches.push({ from: v - half, to: v - inner, logGain }, { from: v + inner, to: v + half, logGain })
  }
  return stretches
}
