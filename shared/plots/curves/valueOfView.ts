import type { SampledCurve } from '../FigureData'
import { placeInCurve } from './interpolateCurve'

/** A drawn quantity (one value a sample) at a frequency, on the chord between its samples over log frequency; null where the curve has no value. */
export function valueOfView(curve: SampledCurve, values: Float64Array, frequency: number): number | null {
  const place = placeInCurve(curve, frequency)
  if (!place) return null
  const before = values[place.index]!
  return place.t === 0 ? before : before + place.t * (values[place.index + 1]! - before)
}
