import type { DiskMargin, GainCrossover, MarginSummary, PhaseCrossover } from '../../types/analysis'
import type { CurvePoint } from './curveAt'
import { distanceOf } from './distanceOf'
import { greatestInBand } from './greatestInBand'
import type { MeasuredCurve } from './MeasuredCurve'

const decibels = (ratio: number) => 20 * Math.log10(ratio)

/** The smallest margin of each kind over all crossings, signed as listed, with what the vector margin d implies and the peaks of |S| = 1/d and |T|. */
export function summariseMeasured(
  curve: MeasuredCurve, from: number, to: number, gainCrossovers: GainCrossover[], phaseCrossovers: PhaseCrossover[], distance: number,
): MarginSummary {
  const nearestZero = (values: number[]) => values.length === 0 ? null : values.reduce((best, value) => Math.abs(value) < Math.abs(best) ? value : best)
  const gains = phaseCrossovers.map(crossing => crossing.gainMargin)
  const phases = gainCrossovers.map(crossing => crossing.phaseMargin)
  return {
    gainIncrease: nearestZero(gains.filter(value => value >= 0)),
    gainDecrease: nearestZero(gains.filter(value => value < 0)),
    phaseLag: nearestZero(phases.filter(value => value >= 0)),
    phaseLead: nearestZero(phases.filter(value => value < 0)),
    delay: nearestZero(gainCrossovers.map(crossing => crossing.delayMargin)),
    impliedGainIncrease: distance < 1 ? -decibels(1 - distance) : null,
    impliedGainDecrease: -decibels(1 + distance),
    impliedPhase: distance < 2 ? 2 * Math.asin(distance / 2) * 180 / Math.PI : 180,
    sensitivityPeak: 1 / distance,
    complementarySensitivityPeak: greatestInBand(curve, from, to, point => Math.exp(point.gain) / distanceOf(point)).value,
  }
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
