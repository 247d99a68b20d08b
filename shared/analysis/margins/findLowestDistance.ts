import type { AxisLoop } from '../search/AxisLoop'
import { AxisSearch } from '../search/AxisSearch'
import { AXIS_VALUE_SIZE, IM, LOG_GAIN, RE, evaluateAxisLoop } from '../search/evaluateAxisLoop'
import type { SearchResult } from '../search/searchLoop'
import type { SettledEnd } from '../search/settleEnd'

const U = 2 ** -53
/** |L| below which |1 + L| is 1 for the accuracy told. */
const NEGLIGIBLE = Math.log(1e-11)
/** Boxes that a loop with several dead times may take under the floor: they grow with frequency, not with its logarithm. */
const EXTENSION_EFFORT = 20_000
const MAX_EXTENSIONS = 60
/** Distances that differ by less than this part are the same to within rounding. */
const EQUAL = 2e-15
const GROWTH = 3

/** The greatest lower bound of |1 + L| over a band. */
export interface LowestDistance {
  distance: number
  /** v where it is attained, or the end it is approached at: 0 or Infinity for the ends of the axis. */
  v: number
  /** How far rounding and the error of the factors may move |1 + L| there. */
  rounding: number
}

/**
 * The greatest lower bound of |1 + L| over from <= v <= to: the least of the minima found, of the band's ends, and of what lies
 * under the gain floor, where the search passed over. There |1 + L| >= 1 - |L|, so only stretches with |L| > 1 - (the least so far)
 * are searched again.
 */
export function findLowestDistance(result: SearchResult, from: number, to: number): LowestDistance | null {
  const { axis, distance, origin, infinity } = result
  if (result.search.stoppedAt < to) return null
  const value = new Float64Array(AXIS_VALUE_SIZE)
  const best = { distance: Number.POSITIVE_INFINITY, v: Number.NaN }
  // Where an end and a place inside are equally low, the place inside is told, and of several the first.
  let inside = false
  const offer = (d: number, v: number, found = false) => {
    if (d < best.distance * (1 - EQUAL) || (found && !inside && d <= best.distance * (1 + EQUAL))) {
      best.distance = d
      best.v = v
      inside = found
    }
  }
  const offerAt = (v: number) => {
    evaluateAxisLoop(axis, v, value)
    if (value[LOG_GAIN]! < 300) offer(Math.hypot(1 + value[RE]!, value[IM]!), v)
  }
  if (from === 0) offerEnd(origin, 0, offer)
  else offerAt(from)
  if (to === Number.POSITIVE_INFINITY) {
    if (axis.deadTime > 0 && axis.degree === 0) offer(Math.abs(Math.expm1(infinity.logGain)), to)
    else offerEnd(infinity, to, offer)
  }
  else if (Number.isFinite(to)) offerAt(to)
  const offerFinds = (finds: AxisSearch['distance'], start = 0) => {
    for (let i = start; i < finds.v.length; i++) {
      if (finds.v[i]! < from || finds.v[i]! > to) continue
      const size = Math.exp(finds.logGain[i]!)
      offer(Math.hypot(1 + size * Math.cos(finds.phase[i]!), size * Math.sin(finds.phase[i]!)), finds.v[i]!, true)
    }
  }
  offerFinds(distance)
  for (const root of result.boundary) {
    if (root.weight > 0 && root.v >= from && root.v <= to) offer(1, root.v, true)
  }
  const { constantGain, real, constantDistance } = result.ties
  if (!constantDistance && !(constantGain && real)) searchBelowFloor(result, from, to, best, offerFinds, offerAt)
  if (best.distance === Number.POSITIVE_INFINITY) return null
  return { ...best, rounding: roundingAt(axis, best.v) }
}

function offerEnd(end: SettledEnd, v: number, offer: (d: number, v: number) => void): void {
  if (Number.isFinite(end.re)) offer(Math.hypot(1 + end.re, end.im), v)
}

/** Goes through what the search passed over for its small |L|, as far as it could hold less than the best so far. */
function searchBelowFloor(result: SearchResult, from: number, to: number, best: { distance: number, v: number },
  offerFinds: (finds: AxisSearch['distance'], start: number) => void, offerAt: (v: number) => void): void {
  const { axis, search, origin, infinity, boundary, endless } = result
  let extra: AxisSearch | undefined
  let told = false
  const threshold = () => best.distance < 1 ? Math.max(NEGLIGIBLE, Math.log1p(-best.distance)) : NEGLIGIBLE
  const look = (a: number, b: number) => {
    const left = Math.max(a, from)
    const right = Math.min(b, to)
    if (!(left < right)) return
    extra ??= new AxisSearch(axis)
    const mark = extra.distance.v.length
    offerAt(left)
    offerAt(right)
    extra.search(left, right, {
      gain: false, phase: false, distance: true, inverseDistance: false,
      floorLog: threshold(), stopAt: Number.POSITIVE_INFINITY, maxFinds: Number.POSITIVE_INFINITY, maxEffort: axis.extension ? EXTENSION_EFFORT : 1e6,
    })
    offerFinds(extra.distance, mark)
    if (extra.stoppedAt === Number.POSITIVE_INFINITY || told) return
    told = true
    result.exceptions.push({
      from: extra.stoppedAt, to: b, code: 'lowest distance open',
      reason: 'far under the gain floor |1 + L| was not searched to the end: it may lie lower there than told, by no more than |L|',
    })
  }
  for (const stretch of search.skipped) {
    // Beyond the end of an endless list the limit at infinity stands for the rest.
    if (stretch.bound < Math.min(best.distance, 1 - 1e-11) && stretch.from < result.stopAt) look(stretch.from, stretch.to)
  }
  const value = new Float64Array(AXIS_VALUE_SIZE)
  const gainAt = (v: number) => {
    evaluateAxisLoop(axis, v, value)
    return value[LOG_GAIN]!
  }
  // Towards an end or an undamped zero |L| falls, as was shown: go on until it no longer matters.
  if (origin.skippedBelow < Number.POSITIVE_INFINITY && from < origin.edge) {
    let edge = origin.edge
    for (let i = 0; i < MAX_EXTENSIONS && edge > from && gainAt(edge) > threshold(); i++, edge /= GROWTH) look(edge / GROWTH, edge)
  }
  for (const root of boundary) {
    let half = root.half
    for (let i = 0; i < MAX_EXTENSIONS && root.weight > 0; i++, half /= GROWTH) {
      const inner = half / GROWTH
      if (root.v - inner === root.v || Math.max(gainAt(root.v - half), gainAt(root.v + half)) <= threshold()) break
      look(root.v - half, root.v - inner)
      look(root.v + inner, root.v + half)
    }
  }
  const turning = axis.deadTime > 0 && axis.degree === 0 && !endless
  if ((infinity.skippedBelow < Number.POSITIVE_INFINITY || turning) && to > infinity.edge) {
    let edge = infinity.edge
    for (let i = 0; i < (turning ? 8 : MAX_EXTENSIONS) && edge < to && !told && gainAt(edge) > threshold(); i++, edge *= GROWTH) {
      if (best.distance <= 1 && axis.extension?.staysClear(edge)) break
      look(edge, edge * GROWTH)
    }
  }
}

/** How far |1 + L| at v is open: rounding of the evaluation, of each given number, and the error of the factors. */
export function roundingAt(axis: AxisLoop, v: number): number {
  const value = new Float64Array(AXIS_VALUE_SIZE)
  const place = v === 0 ? 1e-3 * axis.smallestRoot : v === Number.POSITIVE_INFINITY ? 1e3 * axis.largestRoot : v
  evaluateAxisLoop(axis, place, value)
  let relative = 8 * U * (axis.count + 4)
  const model = axis.sampleTime === undefined ? 1 : Math.hypot(1, place)
  for (let k = 0; k < axis.count; k++) {
    const gap = Math.hypot(axis.re[k]!, place - axis.im[k]!)
    if (gap === 0) continue
    const size = Math.hypot(axis.re[k]!, axis.im[k]!)
    relative += (4 * U * size + model * axis.correction[k]!) / gap
  }
  if (axis.extension) relative += axis.extension.roundingAt(place)
  relative += 4 * U * (place * axis.deadTime + 7 * axis.delayInSamples)
  return relative * Math.max(1e-300, Math.min(Math.exp(value[LOG_GAIN]!), 4))
}
