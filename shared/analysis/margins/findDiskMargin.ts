import { AXIS_VALUE_SIZE, LOG_GAIN, LOG_GAIN_SLOPE, PHASE, PHASE_SLOPE, evaluateAxisLoop } from '../search/evaluateAxisLoop'
import type { SearchResult } from '../search/searchLoop'

const GOLDEN = (3 - Math.sqrt(5)) / 2
const SAMPLES = 6
const STEPS = 60

/**
 * The symmetric disk margin alpha = 1/max|S - 1/2| = min 2|1 + L|/|1 - L| and its v
 * (P. Seiler, A. Packard, P. Gahinet, An introduction to disk margins, IEEE Control Systems Magazine 40, 2020).
 *
 * With m = ln|L| and phi = arg L, |1 + L|^2/|1 - L|^2 = x/(2 - x), x = 1 + cos(phi)/cosh(m), so the least x is sought. This is a search, not a
 * proof: samples on every proven box that could hold less (x >= 1 - 1/cosh m there), at all crossings and minima, each of the lowest refined by golden section.
 */
export function findDiskMargin(result: SearchResult, from: number, to: number): { alpha: number, v: number } | null {
  const { axis, search, gain, phase, distance, origin, infinity } = result
  const value = new Float64Array(AXIS_VALUE_SIZE)
  const best = { x: Number.POSITIVE_INFINITY, v: Number.NaN }
  const offer = (x: number, v: number) => {
    if (x < best.x) {
      best.x = x
      best.v = v
    }
  }
  const at = (v: number) => {
    evaluateAxisLoop(axis, v, value)
    return nearness(value[LOG_GAIN]!, value[PHASE]!)
  }
  for (const [end, v, inside] of [[origin, 0, from === 0], [infinity, Number.POSITIVE_INFINITY, to === Number.POSITIVE_INFINITY]] as const) {
    if (!inside) continue
    if (!Number.isFinite(end.logGain)) offer(1, v)
    else offer(nearness(end.logGain, Math.atan2(end.im, end.re)), v)
  }
  if (from > 0) offer(at(from), from)
  if (Number.isFinite(to)) offer(at(to), to)
  for (const finds of [gain, phase, distance]) {
    for (let i = 0; i < finds.v.length; i++) {
      if (finds.v[i]! >= from && finds.v[i]! <= to) offer(nearness(finds.logGain[i]!, finds.phase[i]!), finds.v[i]!)
    }
  }
  const { laid } = search
  const found: { x: number, from: number, to: number }[] = []
  for (let i = 0; i < laid.from.length; i++) {
    const least = Math.max(0, Math.abs(laid.logGain[i]!) - laid.spread[i]!)
    if (nearness(least, Math.PI) >= best.x) continue
    const left = Math.max(from, laid.from[i]!)
    const right = Math.min(to, laid.to[i]!)
    if (!(left < right)) continue
    evaluateAxisLoop(axis, 0.5 * (left + right), value)
    const turn = Math.hypot(value[LOG_GAIN_SLOPE]!, value[PHASE_SLOPE]!) * (right - left)
    const count = Math.min(4000, SAMPLES + Math.ceil(4 * turn))
    const step = (right - left) / count
    for (let k = 0; k <= count; k++) {
      const v = left + k * step
      const x = at(v)
      if (x < best.x + 0.05) found.push({ x, from: Math.max(from, v - step), to: Math.min(to, v + step) })
      offer(x, v)
    }
  }
  for (const candidate of found) {
    if (candidate.x > best.x + 0.05) continue
    const low = minimise(at, candidate.from, candidate.to)
    offer(low.x, low.v)
  }
  if (!Number.isFinite(best.x)) return null
  return { alpha: 2 * Math.sqrt(best.x / (2 - best.x)), v: best.v }
}

/** 1 + cos(phi)/cosh(m) as a sum of squares, so that nothing cancels near -1. */
function nearness(logGain: number, phase: number): number {
  // the hyperbolic functions overflow long after 1/cosh(m) has become less than a unit in the last place
  if (Math.abs(logGain) > 40) return 1
  return 2 * (Math.sinh(0.5 * logGain) ** 2 + Math.cos(0.5 * phase) ** 2) / Math.cosh(logGain)
}

/** Least value on a stretch by golden section. */
function minimise(at: (v: number) => number, from: number, to: number): { x: number, v: number } {
  let a = from
  let b = to
  let c = a + GOLDEN * (b - a)
  let d = b - GOLDEN * (b - a)
  let atC = at(c)
  let atD = at(d)
  for (let i = 0; i < STEPS && b - a > 1e-9 * b; i++) {
    if (atC < atD) {
      b = d
      d = c
      atD = atC
      c = a + GOLDEN * (b - a)
      atC = at(c)
    }
    else {
      a = c
      c = d
      atC = atD
      d = b - GOLDEN * (b - a)
      atD = at(d)
    }
  }
  return atC < atD ? { x: atC, v: c } : { x: atD, v: d }
}
