import { exactAnswer, type ExactAnswer } from './exactAnswer'
import type { OracleCoefficients } from './ExactLoop'

const DEGREES = 180 / Math.PI

/**
 * Closed-loop poles beyond the boundary with a dead time, from those without: as the dead time grows, a pair crosses the axis at each gain crossover whenever
 * the delay has used up its phase margin, to the right where |L| falls, back where it rises (K. Walton and J. E. Marshall, Direct method for TDS stability
 * analysis, IEE Proceedings D 134, 1987). For strictly proper loops, or end gains below 1. Null where the count without dead time is not decided.
 */
export function addDelayToCount(rational: Pick<ExactAnswer, 'closedLoopUnstablePoles' | 'gainCrossovers'>, deadTime: number): number | null {
  let count = rational.closedLoopUnstablePoles
  if (count === null) return null
  for (const { frequency, phaseMargin, slope } of rational.gainCrossovers) {
    const margin = (phaseMargin < 0 ? phaseMargin + 360 : phaseMargin) / DEGREES
    const turns = (frequency * deadTime - margin) / (2 * Math.PI)
    if (turns > 0) count += (slope === 'falling' ? 2 : -2) * (Math.floor(turns) + 1)
  }
  return count
}

/** The same from coefficients. */
export function closedLoopCountWithDelay(input: OracleCoefficients, deadTime: number): number | null {
  return addDelayToCount(exactAnswer(input), deadTime)
}
