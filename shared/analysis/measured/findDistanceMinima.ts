import { curveInGap } from './curveAt'
import { distanceOf } from './distanceOf'
import { findStationaryDistances } from './findStationaryDistances'
import { frequencyAt } from './findLevelCrossings'
import type { MeasuredCurve } from './MeasuredCurve'

export interface DistanceMinimum {
  frequency: number
  /** |1 + L| */
  distance: number
  /** ln |L| and arg L (rad) there */
  gain: number
  phase: number
  /** how far |1 + L| rises, on its lower side, before it falls under this minimum; Infinity where it nowhere does */
  depth: number
  /** the sample at or before it */
  sample: number
}

/** Dips of |1 + L| shallower than this are rounding of the samples, not minima. */
const shallowest = 1e-9

/** Every local minimum of |1 + L| of the interpolant between its first and last sample, in order of frequency. */
export function findDistanceMinima(curve: MeasuredCurve): DistanceMinimum[] {
  // Between neighbours of this list |1 + L| is monotone, so comparing neighbours finds every minimum, at samples too.
  const places: Omit<DistanceMinimum, 'depth'>[] = []
  const last = curve.frequency.length - 1
  for (let gap = 0; gap <= last; gap++) {
    add(places, curve, curve.frequency[gap]!, Math.min(gap, last - 1), gap === last ? 1 : 0)
    if (gap === last) break
    for (const t of findStationaryDistances(curve, gap)) add(places, curve, frequencyAt(curve, gap, t), gap, t)
  }
  const values = Float64Array.from(places, place => place.distance)
  const left = barriers(values)
  const right = barriers(values.slice().reverse()).reverse()
  return places.flatMap((place, index) => {
    if (index === 0 || index === places.length - 1 || !isMinimum(values, index)) return []
    const depth = Math.min(left[index]!, right[index]!) - place.distance
    return depth > shallowest ? [{ ...place, depth }] : []
  })
}

function add(places: Omit<DistanceMinimum, 'depth'>[], curve: MeasuredCurve, frequency: number, gap: number, t: number): void {
  const point = curveInGap(curve, gap, t)
  places.push({ frequency, distance: distanceOf(point), ...point, sample: t === 1 ? gap + 1 : gap })
}

/** Lower than the value before it, and lower than the next value that differs: a flat bottom counts once, at its start. */
function isMinimum(values: Float64Array, index: number): boolean {
  if (!(values[index]! < values[index - 1]!)) return false
  let next = index + 1
  while (next < values.length && values[next] === values[index]) next++
  return next < values.length && values[next]! > values[index]!
}

/** For each value the highest one between it and the last lower one before it; Infinity where none before is lower. */
function barriers(values: Float64Array): Float64Array {
  const barrier = new Float64Array(values.length)
  const lower: { value: number, highest: number }[] = []
  values.forEach((value, index) => {
    let highest = value
    while (lower.length > 0 && lower[lower.length - 1]!.value >= value) highest = Math.max(highest, lower.pop()!.highest)
    barrier[index] = lower.length === 0 ? Infinity : highest
    lower.push({ value, highest })
  })
  return barrier
}
