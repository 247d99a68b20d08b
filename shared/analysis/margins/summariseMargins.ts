import type { GainCrossover, MarginSummary, PhaseCrossover } from '../../types/analysis'
import { impliedMargins } from './impliedMargins'

export interface SummaryFacts {
  gainCrossovers: GainCrossover[]
  phaseCrossovers: PhaseCrossover[]
  vectorMargin: number
  complementarySensitivityPeak: number
  /** Biproper with |L| > 1 at infinity: any delay at all makes it unstable. */
  noDelayAllowed: boolean
}

/**
 * The smallest margin of each kind of a stable loop: gain up and down (dB), lag and lead (deg), delay (s); null where no crossing
 * limits it. A margin down or a lead is told as the crossings have it: negative.
 */
export function summariseMargins({ gainCrossovers, phaseCrossovers, vectorMargin, complementarySensitivityPeak, noDelayAllowed }: SummaryFacts): MarginSummary {
  let gainIncrease: number | null = null
  let gainDecrease: number | null = null
  for (const { gainMargin } of phaseCrossovers) {
    if (gainMargin >= 0) gainIncrease = Math.min(gainIncrease ?? gainMargin, gainMargin)
    if (gainMargin < 0) gainDecrease = Math.max(gainDecrease ?? gainMargin, gainMargin)
  }
  let phaseLag: number | null = null
  let phaseLead: number | null = null
  let delay: number | null = null
  for (const { phaseMargin, delayMargin } of gainCrossovers) {
    if (phaseMargin >= 0) phaseLag = Math.min(phaseLag ?? phaseMargin, phaseMargin)
    if (phaseMargin < 0) phaseLead = Math.max(phaseLead ?? phaseMargin, phaseMargin)
    delay = Math.min(delay ?? delayMargin, delayMargin)
  }
  return {
    gainIncrease, gainDecrease, phaseLag, phaseLead,
    delay: noDelayAllowed ? 0 : delay,
    ...impliedMargins(vectorMargin),
    sensitivityPeak: 1 / vectorMargin,
    complementarySensitivityPeak,
  }
}
