import { AXIS_VALUE_SIZE, LOG_GAIN, LOG_GAIN_SLOPE, PHASE, PHASE_SLOPE, evaluateAxisLoop } from '../search/evaluateAxisLoop'
import type { SearchResult } from '../search/searchLoop'
import { leastOnStretch } from './leastOnStretch'
import { listStretches } from './listStretches'

const SAMPLES = 6

/**
 * The symmetric disk margin alpha = 1/max|S - 1/2| = min 2|1 + L|/|1 - L| and its v
 * (P. Seiler, A. Packard, P. Gahinet, An introduction to disk margins, IEEE Control Systems Magazine 40, 2020).
 *
 * With m = ln|L| and phi = arg L, |1 + L|^2/|1 - L|^2 = x/(2 - x), x = 1 + cos(phi)/cosh(m), so the least x is sought. This is a search, not a
 * proof: samples on every proven box that could hold less (x >= 1 - 1/cosh m there), at all crossings and minima, each of the lowest refined by golden section.
 */
export function findDiskMargin(result: SearchResult, from: number, to: number): { alpha: number, v: number } | null {
  const { axis, gain, phase, distance, origin, infinity } = result
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
    if (v > 0 && axis.deadTime > 0 && axis.degree === 0) offer(nearness(end.logGain, Math.PI), v)
    else if (!Number.isFinite(end.logGain)) offer(1, v)
    else offer(nearness(end.logGain, Math.atan2(end.im, end.re)), v)
  }
  if (from > 0) offer(at(from), from)
  if (Number.isFinite(to)) offer(at(to), to)
  for (const finds of [gain, phase, distance]) {
    for (let i = 0; i < finds.v.length; i++) {
      if (finds.v[i]! >= from && finds.v[i]! <= to) offer(nearness(finds.logGain[i]!, finds.phase[i]!), finds.v[i]!)
    }
  }
  const found: { x: number, from: number, to: number }[] = []
  for (const { from: left, to: right, least } of listStretches(result, from, to)) {
    if (nearness(least, Math.PI) >= best.x) continue
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
    const low = leastOnStretch(at, candidate.from, candidate.to)
    offer(low.value, low.v)
  }
  if (!Number.isFinite(best.x) || best.x >= 2) return null
  return { alpha: 2 * Math.sqrt(best.x / (2 - best.x)), v: best.v }
}

/** 1 + cos(phi)/cosh(m) as a sum of squares, so that nothing cancels near -1. */
function nearness(logGain: number, phase: number): number {
  // the hyperbolic functions overflow long after 1/cosh(m) has become less than a unit in the last place
  if (Math.abs(logGain) > 40) return 1
  return 2 * (Math.sinh(0.5 * logGain) ** 2 + Math.cos(0.5 * phase) ** 2) / Math.cosh(logGain)
}
