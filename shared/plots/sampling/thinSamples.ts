import type { SamplePoint } from './SamplePoint'
import { viewError } from './viewError'

/** deg; a longer step between neighbours could not be unwrapped again. */
const longestPhaseStep = 100

/**
 * The fewest of the points, ends and pinned ones among them, whose chords stay within `tolerance` (px) of all the others in every view
 * (Douglas and Peucker, "Algorithms for the reduction of the number of points", The Canadian Cartographer 10, 1973, in several views at once).
 * The phases of the points must be unwrapped and all of them valid.
 */
export function thinSamples(points: SamplePoint[], tolerance: number): SamplePoint[] {
  if (points.length < 3) return points
  const kept = new Uint8Array(points.length)
  kept[0] = 1
  kept[points.length - 1] = 1
  const stack: number[] = []
  let from = 0
  for (let i = 1; i < points.length; i++) {
    if (points[i]!.pinned || i === points.length - 1) {
      kept[i] = 1
      stack.push(from, i)
      from = i
    }
  }
  while (stack.length > 0) {
    const last = stack.pop()!
    const first = stack.pop()!
    if (last - first < 2) continue
    const a = points[first]!
    const b = points[last]!
    let worst = -1
    let at = (first + last) >> 1
    for (let i = first + 1; i < last; i++) {
      const error = viewError(a, points[i]!, b, points[i]!.phase - a.phase, b.phase - a.phase)
      if (error > worst) {
        worst = error
        at = i
      }
    }
    if (worst > tolerance || Math.abs(b.phase - a.phase) > longestPhaseStep) {
      kept[at] = 1
      stack.push(first, at, at, last)
    }
  }
  return points.filter((_, i) => kept[i] === 1)
}
