import type { FigureCurve, MeasuredSample } from '../FigureData'
import { valueOfView } from './valueOfView'

/** Phase of a measured sample in degrees, in the turn nearest to that of its curve; NaN where the curve has no value. */
export function samplePhase({ frequency, re, im }: MeasuredSample, { curve }: FigureCurve, phases: Float64Array): number {
  const near = valueOfView(curve, phases, frequency)
  if (near === null) return Number.NaN
  const argument = Math.atan2(im, re) * 180 / Math.PI
  return argument + 360 * Math.round((near - argument) / 360)
}
