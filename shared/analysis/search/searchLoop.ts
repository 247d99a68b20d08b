import type { AxisLoop } from './AxisLoop'
import { AxisSearch, type SearchTask } from './AxisSearch'
import { AXIS_VALUE_SIZE, evaluateAxisLoop } from './evaluateAxisLoop'
import { recogniseTies, type AxisTies } from './recogniseTies'
import type { FindList, SearchException } from './SearchFinds'
import { settleBoundaryRoot, type SettledBoundaryRoot } from './settleBoundaryRoot'
import { settleEnd, type SettledEnd } from './settleEnd'

export interface SearchOptions {
  /** ln of the least |L| that phase crossovers and minima are listed for, at most 0 */
  floorLog: number
  /** Finds of a kind that are listed at most. */
  maxFinds: number
  /** Boxes and finds at most. */
  maxEffort: number
}

/** Everything proven about a loop on its axis, in v. */
export interface SearchResult {
  axis: AxisLoop
  ties: AxisTies
  origin: SettledEnd
  infinity: SettledEnd
  boundary: SettledBoundaryRoot[]
  gain: FindList
  phase: FindList
  distance: FindList
  exceptions: SearchException[]
  /** Arg L endlessly turns at infinity with |L| above the floor: the lists stop at `stopAt`. */
  endless: boolean
  stopAt: number
  search: AxisSearch
}

/** Relative rounding of ln|L| that a tie is told by. */
const TIE = 1e-11
const TWO_PI = 2 * Math.PI

/** Searches the whole axis of a loop: ends, undamped roots, and the stretches between them. */
export function searchLoop(axis: AxisLoop, options: SearchOptions): SearchResult {
  const ties = recogniseTies(axis)
  const search = new AxisSearch(axis)
  const { floorLog } = options
  const constant = ties.constantGain && ties.real
  const wanted = { floorLog, gain: !ties.constantGain, phase: !ties.real, distance: !constant && !ties.constantDistance }
  const origin = settleEnd(axis, 'origin', wanted)
  const turning = axis.deadTime > 0
  const infinity = settleEnd(axis, 'infinity', turning && axis.degree >= 0 ? { ...wanted, phase: false, distance: false } : wanted)
  const boundary = axis.boundary.map(({ v, weight }) => settleBoundaryRoot(axis, v, weight, floorLog, wanted.phase))
  const endless = turning && axis.degree >= 0 && infinity.logGain >= floorLog
  let stopAt = Number.POSITIVE_INFINITY
  let edge = infinity.edge
  if (endless) {
    stopAt = TWO_PI * (options.maxFinds + axis.count + 4) / axis.deadTime + origin.edge
    edge = Math.max(edge, stopAt)
  }
  tellFlatEnds(search.exceptions, origin, infinity)
  tellTies(search.exceptions, axis, ties, boundary)

  const task: SearchTask = {
    gain: wanted.gain, phase: wanted.phase, distance: wanted.distance, inverseDistance: false,
    floorLog, stopAt, maxFinds: options.maxFinds, maxEffort: options.maxEffort,
  }
  if (!constant) {
    let from = origin.edge
    for (const root of boundary) {
      search.search(from, root.v - root.half, task)
      if (!root.settled) {
        search.exceptions.push({
          from: root.v - root.half, to: root.v + root.half, code: 'undamped root',
          reason: 'too near an undamped pole or zero to show that nothing lies here',
        })
      }
      from = root.v + root.half
    }
    search.search(from, edge, task)
  }
  checkOrder(search)
  if (endless) {
    search.exceptions.push({
      from: search.phase.v[Math.min(options.maxFinds, search.phase.v.length) - 1] ?? stopAt,
      to: Number.POSITIVE_INFINITY,
      code: 'endless',
      reason: 'a biproper loop with dead time whose gain at infinity is above the floor: L circles the origin endlessly, '
        + 'so its phase crossovers have no end; the first of them are listed',
    })
  }
  return {
    axis, ties, origin, infinity, boundary, endless, stopAt, search,
    gain: search.gain, phase: search.phase, distance: search.distance, exceptions: search.exceptions,
  }
}

function tellFlatEnds(exceptions: SearchException[], origin: SettledEnd, infinity: SettledEnd): void {
  for (const [end, name] of [[origin, 'zero frequency'], [infinity, 'the high end of the axis']] as const) {
    const stretch = (edge: number) => end === origin ? { from: 0, to: edge } : { from: edge, to: Number.POSITIVE_INFINITY }
    if (end.open) exceptions.push({ ...stretch(end.edge), code: 'open end', reason: end.open })
    if (end.unity) {
      exceptions.push({ ...stretch(end === origin ? 0 : end.edge), code: 'unity at an end', reason: `|L| is exactly 1 at ${name}: no crossing, but its limit` })
    }
    for (const { what, edge } of end.flat) {
      exceptions.push({
        ...stretch(edge), code: `${what} flat at an end`,
        reason: `the leading term of ${FLAT_WORDS[what]} at ${name} is zero to within rounding, so that nothing can be shown right beside it`,
      })
    }
  }
}

const FLAT_WORDS = { gain: '|L|', phase: 'the phase', distance: '|1 + L|' }

function tellTies(exceptions: SearchException[], axis: AxisLoop, ties: AxisTies, boundary: SettledBoundaryRoot[]): void {
  const value = new Float64Array(AXIS_VALUE_SIZE)
  if (ties.constantGain && ties.real) {
    exceptions.push({ from: 0, to: Number.POSITIVE_INFINITY, code: 'constant', reason: 'L is constant: it has no crossings, only its one value' })
    return
  }
  if (ties.constantGain) {
    evaluateAxisLoop(axis, axis.smallestRoot, value)
    if (Math.abs(value[0]!) <= TIE) {
      exceptions.push({
        from: 0, to: Number.POSITIVE_INFINITY, code: 'unity over a stretch',
        reason: '|L| is 1 at every frequency (all-pass): every frequency is a gain crossover, none is listed',
      })
    }
  }
  if (!ties.real) return
  // L is real: negative or positive by turns between the origin, the undamped roots and infinity.
  const marks = [0, ...boundary.map(root => root.v), Number.POSITIVE_INFINITY]
  for (let i = 0; i + 1 < marks.length; i++) {
    const from = marks[i]!
    const to = marks[i + 1]!
    const inside = from === 0 ? (to === Number.POSITIVE_INFINITY ? 1 : 0.5 * to) : to === Number.POSITIVE_INFINITY ? 2 * from : 0.5 * (from + to)
    evaluateAxisLoop(axis, inside, value)
    if (Math.cos(value[1]!) > -0.5) continue
    exceptions.push({
      from, to, code: 'real over a stretch',
      reason: 'L is real and negative over this whole stretch: every frequency of it is a phase crossover, none is listed',
    })
  }
}

/** Finds must be strictly increasing, each inside its own bracket; anything else is a fault that is told, not passed on. */
function checkOrder(search: AxisSearch): void {
  for (const [name, finds] of [['gain', search.gain], ['phase', search.phase], ['distance', search.distance]] as const) {
    for (let i = 0; i < finds.v.length; i++) {
      const inside = finds.v[i]! >= finds.from[i]! && finds.v[i]! <= finds.to[i]!
      if (inside && (i === 0 || finds.v[i]! > finds.v[i - 1]!)) continue
      search.exceptions.push({
        from: finds.from[i]!, to: finds.to[i]!, code: 'order',
        reason: `a find of the ${name} left its bracket or its order while it was refined`,
      })
    }
  }
}
