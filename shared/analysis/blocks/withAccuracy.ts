import type { LoopAnalysis } from '../../types/analysis'

/** Relative error of the factors up to which what is proven of them is proven of the loop gain as given. */
const CONTRACT = 1e-9

/**
 * The analysis with its coverage no longer proven where the factors analysed may be farther from the loop gain as given than the accuracy of the contract: its numbers are then
 * those of the factors.
 */
export function withAccuracy(analysis: LoopAnalysis): LoopAnalysis {
  const accuracy = analysis.structure?.accuracy
  if (!accuracy || accuracy.relative <= CONTRACT) return analysis
  const { from, to, exceptions } = analysis.coverage
  const size = Number.isFinite(accuracy.relative) ? `by up to ${accuracy.relative.toExponential(0)} (relative)` : 'without a bound'
  return {
    ...analysis,
    coverage: {
      ...analysis.coverage,
      proven: false,
      exceptions: [{
        from, to, code: 'accuracy',
        reason: `the factors analysed may differ ${size} from the loop gain as given, more than 1e-9: ${accuracy.basis}. ${adviceOf(accuracy.basis)}`.trimEnd(),
      }, ...exceptions],
    },
  }
}

function adviceOf(basis: string): string {
  const advice = [
    ...basis.includes('state space') ? ['Give its blocks in better conditioned coordinates or as modal table.'] : [],
    ...basis.includes('discrete equivalent') ? ['A zero or pole in z is held to 1e-16 only: of a slow, light mode sampled very fast that is much of its distance from the unit circle.'] : [],
  ]
  return advice.join(' ')
}
