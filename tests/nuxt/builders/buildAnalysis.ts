import type { LoopAnalysis } from '#shared/types/analysis'

/** A stable loop with one crossing of each kind, hand-made: only the fields a test is about are given. */
export function buildAnalysis(fields: Partial<LoopAnalysis> = {}): LoopAnalysis {
  return {
    frequencyUnit: 'rad/s',
    gainCrossovers: [{ frequency: 10, phaseMargin: 60, delayMargin: 0.1, slope: 'falling' }],
    phaseCrossovers: [{ frequency: 40, gainMargin: 12, slope: 'falling' }],
    closestApproaches: [{ frequency: 20, distance: 0.7, gainChange: 4, phaseChange: -20 }],
    vectorMargin: { distance: 0.7, frequency: 20 },
    summary: {
      gainIncrease: 12, gainDecrease: null, phaseLag: 60, phaseLead: null, delay: 0.1,
      impliedGainIncrease: 10.5, impliedGainDecrease: 4.6, impliedPhase: 41, sensitivityPeak: 1.43, complementarySensitivityPeak: 1.1,
    },
    stability: { verdict: 'stable', basis: 'counted', openLoopUnstablePoles: 0, encirclements: 0, closedLoopUnstablePoles: 0 },
    coverage: { proven: true, from: 0, to: 'infinity', exceptions: [] },
    ...fields,
  }
}

export const unstable: Partial<LoopAnalysis> = {
  summary: null,
  stability: { verdict: 'unstable', basis: 'counted', openLoopUnstablePoles: 0, encirclements: -2, closedLoopUnstablePoles: 2 },
}
