import type { AxisLoop } from './AxisLoop'
import { expandEnd, type AxisEnd, type EndSeries } from './expandEnd'
import { LogSeries, SERIES_DEGREE } from './LogSeries'
import { StationarySeries } from './StationarySeries'

const N = SERIES_DEGREE
const MAX_TRIES = 120

/** What was shown of an end of the axis: nothing is found between the end and `edge`, the end itself apart. */
export interface SettledEnd {
  /** v from (to) where the search of the inside starts (ends). */
  edge: number
  /** ln|L| at the end where it is finite and not zero, else -Infinity or Infinity. */
  logGain: number
  /** Arg L at the end in quarter turns (-1, 0, 1, 2) of a finite L, of L as the end is neared otherwise; NaN: no whole number. */
  quarterTurns: number
  /** Real L at the end (finite or 0); NaN where it is infinite or not real. */
  value: number
  /** Re and Im of L at the end where it is finite, else NaN. */
  re: number
  im: number
  /** Sign of arg L less its end value, as the end is left; 0 unknown. */
  phaseOffset: number
  /** |L| is 1 at the end to within rounding. */
  unity: boolean
  /** What could not be shown although the edge was drawn far in. */
  flat: ('gain' | 'phase' | 'distance')[]
  /** Greatest ln|L| between the edge and the end where |L| falls to 0 there, else Infinity: nothing was searched there for minima. */
  skippedBelow: number
  /** Why nothing is known of L towards this end; undefined where it is. */
  open?: string
}

export interface EndDemands {
  floorLog: number
  gain: boolean
  phase: boolean
  distance: boolean
}

/** Draws the edge of an end towards it until every demanded test holds between the edge and the end. */
export function settleEnd(axis: AxisLoop, end: AxisEnd, demands: EndDemands): SettledEnd {
  if (end === 'infinity' && axis.extension) return axis.extension.settleInfinity(demands)
  const log = new LogSeries()
  const stationary = new StationarySeries()
  const origin = end === 'origin'
  let reach = origin ? 0.3 * axis.smallestRoot : 0.3 / axis.largestRoot
  if (origin && axis.deadTime > 0) reach = Math.min(reach, 0.3 / axis.deadTime)
  let series = expandEnd(axis, end, reach, log)
  let unsettled: SettledEnd['flat'] = []
  let unity = false
  let offset = phaseOffsetOf(series)
  let lastGoodReach = reach
  for (let i = 0; i < MAX_TRIES; i++) {
    const tie = { unity: false }
    const failed: SettledEnd['flat'] = []
    if (demands.gain && !gainHolds(series, demands, tie)) failed.push('gain')
    if (series.weight <= 0) {
      if (demands.phase && !phaseHolds(series)) failed.push('phase')
      if (demands.distance && !distanceHolds(series, stationary)) failed.push('distance')
    }
    else if (!belowFloor(series, demands)) failed.push('gain')
    unsettled = failed
    unity = tie.unity
    lastGoodReach = reach
    if (failed.length === 0) break
    // A test that still fails this near the end fails by rounding: its leading term is zero for all one can tell.
    const nearest = origin ? 1e-9 * axis.smallestRoot : 1e-9 / axis.largestRoot
    if (reach < nearest && !failed.includes('gain') && series.weight === 0) break
    reach *= reach < nearest ? 0.01 : 0.4
    if (!(reach > 1e-290 && reach < 1e290)) break
    series = expandEnd(axis, end, reach, log)
  }
  // Terms of dead time may be of no use until the reach is short.
  if (axis.extension) offset = phaseOffsetOf(series)
  return describe(axis, end, series, lastGoodReach, offset, unity, unsettled)
}

function describe(axis: AxisLoop, end: AxisEnd, series: EndSeries, reach: number, offset: number, unity: boolean,
  flat: SettledEnd['flat']): SettledEnd {
  const { weight, log, quarterTurns } = series
  const size = weight === 0 ? Math.exp(log.re[0]!) : 0
  const exact = weight === 0 ? (unity ? 1 : size) : 0
  const finite = weight >= 0
  const re = !finite ? Number.NaN : Number.isNaN(quarterTurns) ? exact * Math.cos(log.im[0]!) : exact * [1, 0, -1, 0][((quarterTurns % 4) + 4) % 4]!
  const im = !finite ? Number.NaN : Number.isNaN(quarterTurns) ? exact * Math.sin(log.im[0]!) : 0
  const atEdge = weight * Math.log(reach) + log.re[0]! + log.spreadRe
  return {
    edge: end === 'origin' ? reach : 1 / reach,
    logGain: weight === 0 ? log.re[0]! : weight > 0 ? Number.NEGATIVE_INFINITY : Number.POSITIVE_INFINITY,
    quarterTurns,
    value: im === 0 ? re : Number.NaN,
    re, im,
    phaseOffset: offset,
    unity,
    flat,
    skippedBelow: weight > 0 ? atEdge : Number.POSITIVE_INFINITY,
  }
}

/** Sign of the first phase term that is not zero for all one can tell. */
function phaseOffsetOf(series: EndSeries): number {
  const { im, steady } = series.log
  for (let n = 1; n <= N; n += 2) {
    if (Math.abs(im[n]!) > steady[1]!) return Math.sign(im[n]!)
  }
  return 0
}

function weightedSum(terms: Float64Array, first: number): number {
  let sum = 0
  for (let n = first; n <= N; n++) sum += n * Math.abs(terms[n]!)
  return sum
}

/** No |L| = 1 between the edge and the end. */
function gainHolds({ log, weight, reach }: EndSeries, demands: EndDemands, tie: { unity: boolean }): boolean {
  const bound0 = log.steady[0]! + log.tail[0]!
  const bound1 = log.steady[1]! + log.tail[1]!
  if (weight === 0) {
    if (Math.abs(log.re[0]!) > log.spreadRe) return true
    // Even series: the leading term outweighs the rest, so ln|L| is monotone; only |L| = 1 at the end itself is left.
    if (Math.abs(log.re[0]!) > log.steady[0]!) return false
    tie.unity = true
    return 2 * Math.abs(log.re[2]!) > weightedSum(log.re, 4) + bound1
  }
  if (Math.abs(weight) <= weightedSum(log.re, 2) + bound1) return false
  let atEdge = weight * Math.log(reach)
  for (let n = 0; n <= N; n++) atEdge += log.re[n]!
  const slack = bound0 + 1e-15 * Math.abs(weight * Math.log(reach))
  return weight < 0 ? atEdge > slack : atEdge < Math.min(0, demands.floorLog) - slack
}

function belowFloor({ log, weight, reach }: EndSeries, demands: EndDemands): boolean {
  return weight > weightedSum(log.re, 2) + log.steady[1]! + log.tail[1]!
    && weight * Math.log(reach) + log.re[0]! + log.spreadRe < Math.min(0, demands.floorLog)
}

/** No arg L = 180 deg between the edge and the end. */
function phaseHolds({ log, quarterTurns }: EndSeries): boolean {
  if (quarterTurns === 2 || quarterTurns === -2) {
    let rest = log.tail[0]! + log.steady[1]!
    for (let n = 3; n <= N; n++) rest += Math.abs(log.im[n]!)
    return Math.abs(log.im[1]!) > rest
  }
  return Math.PI - Math.abs(log.im[0]!) > log.spreadIm
}

/** No stationary |1 + L| between the edge and the end. */
function distanceHolds({ log, weight, reach, quarterTurns }: EndSeries, stationary: StationarySeries): boolean {
  if (weight < 0) {
    // |m'| (|L| - 1) > |phi'|, with x m' = weight + ..., |L| least at the edge
    const a = weightedSum(log.re, 1) + log.steady[1]! + log.tail[1]!
    const b = weightedSum(log.im, 1) + log.steady[1]! + log.tail[1]!
    const least = weight * Math.log(reach) + log.re[0]! - log.spreadRe - 1e-12
    return -weight > a && (-weight - a) * Math.expm1(least) > b
  }
  if (!stationary.build(log, 0, 1)) return false
  const f = stationary.coefficients
  const parity = !Number.isNaN(quarterTurns)
  const lead = parity ? 1 : 0
  let rest = stationary.tail[0]! + stationary.steady[0]!
  for (let n = lead + 1; n < N; n++) {
    if (!parity || n % 2 === 1) rest += Math.abs(f[n]!)
  }
  return Math.abs(f[lead]!) > rest
}
