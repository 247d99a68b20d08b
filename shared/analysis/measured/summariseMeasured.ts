import type { DiskMargin, GainCrossover, MarginSummary, PhaseCrossover } from '../../types/analysis'
import { summariseMargins } from '../margins/summariseMargins'
import type { CurvePoint } from './curveAt'
import { distanceOf } from './distanceOf'
import { greatestInBand } from './greatestInBand'
import type { MeasuredCurve } from './MeasuredCurve'

const decibels = (ratio: number) => 20 * Math.log10(ratio)

/** The smallest margin of each kind over all crossings, with what the vector margin implies and the peaks of |S| and |T| over the band. */
export function summariseMeasured(
  curve: MeasuredCurve, from: number, to: number, gainCrossovers: GainCrossover[], phaseCrossovers: PhaseCrossover[], vectorMargin: number,
): MarginSummary {
  const complementarySensitivityPeak = greatestInBand(curve, from, to, point => Math.exp(point.gain) / distanceOf(point)).value
  return summariseMargins({ gainCrossovers, phaseCrossovers, vectorMargin, complementarySensitivityPeak, noDelayAllowed: false })
}

/**
 * The symmetric disk margin over a band of the data: alpha = 1 / max|S - 1/2| = 2 / max|(1 - L) / (1 + L)|.
 * Source: P. Seiler, A. Packard, P. Gahinet, An introduction to disk margins, IEEE Control Systems Magazine 40 (2020).
 */
export function diskMarginOf(curve: MeasuredCurve, from: number, to: number): DiskMargin {
  const opposite = (point: CurvePoint) => distanceOf({ gain: point.gain, phase: point.phase + Math.PI }) / distanceOf(point)
  const { value, frequency } = greatestInBand(curve, from, to, opposite)
  const alpha = 2 / value
  return {
    alpha,
    frequency,
    gainIncrease: alpha < 2 ? decibels((2 + alpha) / (2 - alpha)) : null,
    gainDecrease: alpha < 2 ? decibels((2 - alpha) / (2 + alpha)) : null,
    phase: 2 * Math.atan(alpha / 2) * 180 / Math.PI,
  }
}
