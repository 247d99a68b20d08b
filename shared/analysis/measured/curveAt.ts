import { cubicOfGap, valueOf } from './cubicOfGap'
import type { MeasuredCurve } from './MeasuredCurve'

export interface CurvePoint {
  /** ln |L| */
  gain: number
  /** rad, unwrapped */
  phase: number
}

/** The gap whose samples enclose a frequency (the left sample's index); null outside the data. */
export function gapAt({ frequency }: MeasuredCurve, wanted: number): number | null {
  let [low, high] = [0, frequency.length - 1]
  if (!(wanted >= frequency[low]! && wanted <= frequency[high]!)) return null
  while (low + 1 < high) {
    const middle = (low + high) >> 1
    if (frequency[middle]! <= wanted) low = middle
    else high = middle
  }
  return low
}

/** log L at a place in a gap, t from 0 to 1 over the logarithm of frequency. */
export function curveInGap(curve: MeasuredCurve, gap: number, t: number): CurvePoint {
  return {
    gain: valueOf(cubicOfGap(curve.x, curve.gain, curve.gainSlope, gap), t),
    phase: valueOf(cubicOfGap(curve.x, curve.phase, curve.phaseSlope, gap), t),
  }
}

/** log L at a frequency in the input's unit; null outside the data. */
export function curveAt(curve: MeasuredCurve, frequency: number): CurvePoint | null {
  const gap = gapAt(curve, frequency)
  if (gap === null) return null
  const t = (Math.log(frequency) - curve.x[gap]!) / (curve.x[gap + 1]! - curve.x[gap]!)
  return curveInGap(curve, gap, Math.min(1, Math.max(0, t)))
}
