import type { SampledCurve } from '../FigureData'

/** Frequency of the place on a curve (drawn at xs, ys, px) that is nearest to a point; null where none is within `reach` px. */
export function nearestOnCurve({ frequency }: SampledCurve, xs: Float64Array, ys: Float64Array, x: number, y: number, reach: number): number | null {
  let best = reach * reach
  let found: number | null = null
  for (let i = 1; i < xs.length; i++) {
    const [x0, y0] = [xs[i - 1]!, ys[i - 1]!]
    const [dx, dy] = [xs[i]! - x0, ys[i]! - y0]
    const length2 = dx * dx + dy * dy
    const t = length2 > 0 ? Math.max(0, Math.min(1, ((x - x0) * dx + (y - y0) * dy) / length2)) : 0
    const distance2 = (x0 + t * dx - x) ** 2 + (y0 + t * dy - y) ** 2
    if (distance2 < best) {
      best = distance2
      found = frequency[i - 1]! * (frequency[i]! / frequency[i - 1]!) ** t
    }
  }
  return found
}
