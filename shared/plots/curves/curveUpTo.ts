import type { SampledCurve } from '../FigureData'

/** The first samples of a curve, up to but without the one at `end`. */
export function curveUpTo({ frequency, re, im }: SampledCurve, end: number): SampledCurve {
  return { frequency: frequency.subarray(0, end), re: re.subarray(0, end), im: im.subarray(0, end) }
}
