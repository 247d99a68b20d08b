import type { AxisLoop } from './AxisLoop'
import { expandEnd, type AxisEnd, type EndSeries } from './expandEnd'
import { leadingTerm } from './leadingTerm'
import { LogSeries, SERIES_DEGREE } from './LogSeries'
import { StationarySeries } from './StationarySeries'

const N = SERIES_DEGREE
const MAX_TRIES = 120
/** Nearer to the end than this part of the nearest root a test that fails does so by rounding. */
const NEAREST = 1e-9

export interface FlatEnd {
  what: 'gain' | 'phase' | 'distance'
  /** v up to (from) which nothing is shown, counted from the end. */
  edge: number
}

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
  /** What could not be shown right beside the end, because its leading term there is zero to within rounding, and up to which v. */
  flat: FlatEnd[]
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
  let flat: FlatEnd[] = []
  let unity = false
  let fallback: { reach: number, flat: FlatEnd[] } | undefined
  let offset = phaseLead(series).sign
  const nearest = NEAREST * (origin ? axis.smallestRoot : 1 / axis.largestRoot)
  let tried = reach
  for (let i = 0; i < MAX_TRIES; i++) {
    const failed: FlatEnd['what'][] = []
    flat = []
    const edgeAt = (part: number) => origin ? reach * part : 1 / (reach * part)
    const note = (what: FlatEnd['what'], to: number | null) => {
      if (to === null) failed.push(what)
      else if (to > 0) flat.push({ what, edge: edgeAt(to) })
    }
    tried = reach
    unity = series.weight === 0 && demands.gain && Math.abs(log.re[0]!) <= log.steadyRe[0]!
    if (demands.gain) note('gain', gainFlatness(series, demands))
    if (series.weight <= 0) {
      if (demands.phase) note('phase', phaseFlatness(series))
      if (demands.distance) note('distance', distanceFlatness(series, stationary))
    }
    else if (!belowFloor(series, demands)) failed.push('gain')
    if (failed.length === 0 && flat.length === 0) break
    // Flat as seen from here; nearer to the end its leading term may yet stand out. If not, this is where to come back to.
    if (failed.length === 0) fallback ??= { reach, flat }
    const exhausted = reach < nearest && series.weight <= 0 && !failed.includes('gain') && (series.weight === 0 || !failed.includes('distance'))
    const next = reach * (reach < nearest ? 0.01 : 0.4)
    if (exhausted || !(next > 1e-290 && next < 1e290)) {
      if (fallback) {
        tried = fallback.reach
        flat = fallback.flat
        series = expandEnd(axis, end, tried, log)
      }
      else for (const what of failed) flat.push({ what, edge: edgeAt(1) })
      break
    }
    reach = next
    series = expandEnd(axis, end, reach, log)
  }
  // Terms of several dead times may be of no use until the reach is short.
  if (axis.extension) offset = phaseLead(series).sign
  return describe(axis, end, series, tried, offset, unity, flat)
}

function describe(axis: AxisLoop, end: AxisEnd, series: EndSeries, reach: number, offset: number, unity: boolean,
  flat: FlatEnd[]): SettledEnd {
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

function weightedSum(terms: Float64Array, first: number): number {
  let sum = 0
  for (let n = first; n <= N; n++) sum += n * Math.abs(terms[n]!)
  return sum
}

/** No |L| = 1 between the edge and the end: null where that does not hold, else the part of the stretch it is not shown for. */
function gainFlatness({ log, weight, reach }: EndSeries, demands: EndDemands): number | null {
  const bound0 = log.steadyRe[0]! + log.tail[0]!
  const bound1 = log.steadyRe[1]! + log.tail[1]!
  if (weight === 0) {
    if (Math.abs(log.re[0]!) > log.spreadRe) return 0
    if (Math.abs(log.re[0]!) > log.steadyRe[0]!) return null
    // |L| = 1 at the end itself: beside it ln|L| is monotone where the leading term of its even series rules.
    const lead = leadingTerm(n => n * log.re[n]!, 2, 2, N, log.steadyRe[1]!, log.tail[1]!)
    return lead.holds ? lead.flatTo : null
  }
  if (Math.abs(weight) <= weightedSum(log.re, 2) + bound1) return null
  let atEdge = weight * Math.log(reach)
  for (let n = 0; n <= N; n++) atEdge += log.re[n]!
  const slack = bound0 + 1e-15 * Math.abs(weight * Math.log(reach))
  const clear = weight < 0 ? atEdge > slack : atEdge < Math.min(0, demands.floorLog) - slack
  return clear ? 0 : null
}

function belowFloor({ log, weight, reach }: EndSeries, demands: EndDemands): boolean {
  return weight > weightedSum(log.re, 2) + log.steadyRe[1]! + log.tail[1]!
    // Clear of the floor, so that the box beside the edge soon is under it too.
    && weight * Math.log(reach) + log.re[0]! + log.spreadRe < Math.min(0, demands.floorLog) - 0.1
}

/** The series of arg L less its end value: odd in x. */
function phaseLead({ log }: EndSeries): ReturnType<typeof leadingTerm> {
  return leadingTerm(n => log.im[n]!, 1, 2, N, log.steady[1]!, log.tail[0]!)
}

/** No arg L = 180 deg between the edge and the end; returns as `gainFlatness`. */
function phaseFlatness(series: EndSeries): number | null {
  const { log, quarterTurns } = series
  const gap = Math.PI - Math.abs(log.im[0]!)
  if (gap > log.spreadIm) return 0
  if (quarterTurns !== 2 && gap > 2 * log.steady[0]!) return null
  const lead = phaseLead(series)
  return lead.holds ? lead.flatTo : null
}

/** No stationary |1 + L| between the edge and the end; returns as `gainFlatness`. */
function distanceFlatness({ log, weight, reach, quarterTurns }: EndSeries, stationary: StationarySeries): number | null {
  if (weight < 0) {
    // |m'| (|L| - 1) > |phi'|, with x m' = weight + ..., |L| least at the edge
    const a = weightedSum(log.re, 1) + log.steadyRe[1]! + log.tail[1]!
    const b = weightedSum(log.im, 1) + log.steady[1]! + log.tail[1]!
    const least = weight * Math.log(reach) + log.re[0]! - log.spreadRe - 1e-12
    return -weight > a && (-weight - a) * Math.expm1(least) > b ? 0 : null
  }
  if (!stationary.build(log, 0, 1)) return null
  const f = stationary.coefficients
  // Even in x, so odd in its slope, unless a dead time of a fraction of a sample spoils the symmetry.
  const parity = !Number.isNaN(quarterTurns)
  const lead = leadingTerm(n => f[n]!, parity ? 1 : 0, parity ? 2 : 1, N - 1, stationary.steady[0]!, stationary.tail[0]!)
  return lead.holds ? lead.flatTo : null
}
