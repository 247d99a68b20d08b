import { formatDistance } from '../../formatting/formatDistance'
import { formatFrequency } from '../../formatting/formatFrequency'
import { formatGainChange } from '../../formatting/formatGainChange'
import { formatGainMargin } from '../../formatting/formatGainMargin'
import { formatPhaseChange } from '../../formatting/formatPhaseChange'
import { formatPhaseMargin } from '../../formatting/formatPhaseMargin'
import type { ClosestApproach, FrequencyUnit, GainCrossover, LoopAnalysis, PhaseCrossover } from '../../types/analysis'

/** Whether margins may be told of the loop: one that is not stable has none. */
export function hasMargins(analysis: LoopAnalysis): boolean {
  return analysis.stability.verdict === 'stable'
}

/** 'gain rises 3.2 dB, lag 25.3 deg': the one change that takes this point of L to -1. */
export function changeWords({ gainChange, phaseChange }: ClosestApproach): string {
  return `${formatGainChange(gainChange)}, ${formatPhaseChange(phaseChange)}`
}

function distanceWords(distance: number | undefined): string {
  return distance === undefined ? '' : `distance ${formatDistance(distance)}`
}

function joined(parts: string[]): string {
  return parts.filter(part => part !== '').join(', ')
}

/** What a mark says to one who cannot see it; of a loop that is not stable only the distance to -1. */
export function gainCrossoverWords(crossing: GainCrossover, unit: FrequencyUnit, margins: boolean): string {
  return joined([`gain crossover at ${formatFrequency(crossing.frequency, unit)}`, crossing.slope,
    margins ? formatPhaseMargin(crossing.phaseMargin) : distanceWords(crossing.distance)])
}

/** As `gainCrossoverWords`, of a phase crossover. */
export function phaseCrossoverWords(crossing: PhaseCrossover, unit: FrequencyUnit, margins: boolean): string {
  return joined([`phase crossover at ${formatFrequency(crossing.frequency, unit)}`,
    margins ? formatGainMargin(crossing.gainMargin) : distanceWords(crossing.distance)])
}

/** As `gainCrossoverWords`, of a closest approach. */
export function approachWords(approach: ClosestApproach, unit: FrequencyUnit, margins: boolean): string {
  return joined([`closest approach ${formatDistance(approach.distance)} at ${formatFrequency(approach.frequency, unit)}`,
    margins ? `one change that reaches −1: ${changeWords(approach)}` : ''])
}
