import type { ApproximationDifference, ExpressionInput, ListedFrequency, LoopAnalysis } from '../../types/analysis'
import type { LoopGain } from '../LoopGain'
import { wrapDegrees } from '../margins/wrapDegrees'
import { approximateResponse } from './approximateLoopGain'

const DEGREES = 180 / Math.PI

/**
 * The analysis of a loop with a hold, with what its continuous approximation says less what the exact equivalent says at each crossing and approach; unchanged for a
 * loop without a hold. Left out where either has no value.
 *
 * @param exact the loop gain that was analysed
 */
export function withApproximation(analysis: LoopAnalysis, input: ExpressionInput, exact: () => LoopGain): LoopAnalysis {
  const approximation = analysis.structure && approximateResponse(input)
  if (!analysis.structure || !approximation) return analysis
  const unit = analysis.frequencyUnit === 'Hz' ? 2 * Math.PI : 1
  const { evaluate, axisEnd } = exact()
  const value = new Float64Array(2)
  const differenceAt = (frequency: ListedFrequency): ApproximationDifference | undefined => {
    const w = Math.min(axisEnd, frequency === 'infinity' ? axisEnd : frequency * unit)
    if (!evaluate(w, value)) return undefined
    const [re, im] = [value[0] as number, value[1] as number]
    const other = approximation.response(w)
    const difference = {
      gain: 20 * Math.log10(Math.hypot(other.re, other.im) / Math.hypot(re, im)),
      // the angle of other times the conjugate of exact, so that nothing wraps
      phase: wrapDegrees(DEGREES * Math.atan2(other.im * re - other.re * im, other.re * re + other.im * im)),
      distance: Math.hypot(1 + other.re, other.im) - Math.hypot(1 + re, im),
    }
    return Object.values(difference).every(Number.isFinite) ? difference : undefined
  }
  const mark = <T extends { frequency: ListedFrequency }>(list: T[]) => list.map((entry) => {
    const difference = differenceAt(entry.frequency)
    return difference ? { ...entry, approximation: difference } : entry
  })
  return {
    ...analysis,
    gainCrossovers: mark(analysis.gainCrossovers),
    phaseCrossovers: mark(analysis.phaseCrossovers),
    closestApproaches: mark(analysis.closestApproaches),
    structure: { ...analysis.structure, approximated: true },
  }
}
