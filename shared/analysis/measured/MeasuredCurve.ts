/**
 * A measured loop gain as a curve: log L = gain + j phase between its samples as a monotone cubic of x, the natural logarithm of
 * frequency. Gain and phase are monotone in every gap between two samples, so that a gap holds the crossings its ends tell.
 */
export interface MeasuredCurve {
  /** sample frequencies, above 0 and rising, in the input's unit; all arrays are of this length */
  frequency: Float64Array
  /** ln frequency */
  x: Float64Array
  /** ln |L| */
  gain: Float64Array
  /** arg L in rad, unwrapped by the shorter way from sample to sample */
  phase: Float64Array
  /** d gain / dx and d phase / dx at the samples */
  gainSlope: Float64Array
  phaseSlope: Float64Array
  /** L */
  re: Float64Array
  im: Float64Array
  /** 95 % confidence radius in the plane of L, Infinity where not bounded; null without coherence or averages */
  radius: Float64Array | null
  /** L at a sample of frequency 0, which has no place on a logarithmic axis */
  atZero: { re: number, im: number } | null
}
