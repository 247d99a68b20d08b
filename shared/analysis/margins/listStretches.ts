import { AXIS_VALUE_SIZE, LOG_GAIN, evaluateAxisLoop } from '../search/evaluateAxisLoop'
import type { SearchResult } from '../search/searchLoop'

/** A stretch of the axis. */
export interface Stretch {
  from: number
  to: number
  /** The value of ln|L| on it that is nearest to 0. */
  least: number
  /** Beside an end or an undamped pole, where L nears its limit smoothly: no box of the search. */
  outer: boolean
}

/** ln|L| from which |T| is 1, and |1 + L| endless, for the accuracy told. */
const OVERWHELMING = 27
const STEPS = 60
const GROWTH = 3
/** |L| differs from a finite end value by the square of this part of the edge, at most. */
const NEAREST = 1e-6

/**
 * The axis between from and to in stretches with the least | ln|L| | on each: the boxes of the search, and what it settled
 * without boxes (beside the ends and beside undamped poles) as far out as |L| still tells. Where |L| falls to zero nothing is listed.
 */
export function listStretches(result: SearchResult, from: number, to: number): Stretch[] {
  const { axis, search, origin, infinity, boundary } = result
  const list: Stretch[] = []
  const value = new Float64Array(AXIS_VALUE_SIZE)
  const gainAt = (v: number) => {
    evaluateAxisLoop(axis, v, value)
    return value[LOG_GAIN]!
  }
  const add = (a: number, b: number, least: number, outer: boolean) => {
    const left = Math.max(a, from)
    const right = Math.min(b, to)
    if (left < right) list.push({ from: left, to: right, least, outer })
  }
  const { laid } = search
  for (let i = 0; i < laid.from.length; i++) {
    add(laid.from[i]!, laid.to[i]!, Math.max(0, Math.abs(laid.logGain[i]!) - laid.spread[i]!) * Math.sign(laid.logGain[i]!), false)
  }
  for (const [end, factor] of [[origin, 1 / GROWTH], [infinity, GROWTH]] as const) {
    if (end.logGain === Number.NEGATIVE_INFINITY || (end === infinity && axis.deadTime > 0)) continue
    let edge = end.edge
    for (let i = 0; i < STEPS; i++) {
      const gain = gainAt(edge)
      const reach = factor < 1 ? edge / end.edge : end.edge / edge
      if (end.logGain === Number.POSITIVE_INFINITY ? gain > OVERWHELMING : reach < NEAREST) break
      const next = edge * factor
      add(Math.min(edge, next), Math.max(edge, next), end.logGain === Number.POSITIVE_INFINITY ? Math.max(0, gain) : 0, true)
      edge = next
    }
  }
  for (const root of boundary) {
    let half = root.half
    for (let i = 0; i < STEPS && root.weight < 0; i++, half /= GROWTH) {
      const inner = half / GROWTH
      const least = Math.min(gainAt(root.v - half), gainAt(root.v + half))
      if (root.v - inner === root.v || least > OVERWHELMING) break
      add(root.v - half, root.v - inner, Math.max(0, least), true)
      add(root.v + inner, root.v + half, Math.max(0, least), true)
    }
  }
  return list
}
