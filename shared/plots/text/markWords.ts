import type { ClosestApproach, FrequencyUnit, GainCrossover, ListedFrequency, LoopAnalysis, PhaseCrossover } from '../../types/analysis'
import { formatFixed, formatSignificant } from './formatNumber'

/** 'lag 27.1 deg' or 'lead 20.0 deg': what reaches -1. */
export function phaseMarginWords(phaseMargin: number): string {
  return phaseMargin < 0 ? `lead ${formatFixed(-phaseMargin, 1)} deg` : `lag ${formatFixed(phaseMargin, 1)} deg`
}

/** 'gain may rise 12.4 dB' or 'gain may fall 6.1 dB'. */
export function gainMarginWords(gainMargin: number): string {
  return gainMargin < 0 ? `gain may fall ${formatFixed(-gainMargin, 1)} dB` : `gain may rise ${formatFixed(gainMargin, 1)} dB`
}

/** 'gain up 3.2 dB, lag 25.3 deg': the one change that takes this point of L to -1. */
export function changeWords({ gainChange, phaseChange }: ClosestApproach): string {
  const gain = `gain ${gainChange < 0 ? 'down' : 'up'} ${formatFixed(Math.abs(gainChange), 1)} dB`
  const phase = `${phaseChange > 0 ? 'lead' : 'lag'} ${formatFixed(Math.abs(phaseChange), 1)} deg`
  return `${gain}, ${phase}`
}

/** '81.5 rad/s'; 'zero frequency' and 'infinite frequency' at the ends of the axis. */
export function frequencyWords(frequency: ListedFrequency, unit: FrequencyUnit): string {
  if (frequency === 'infinity') return 'infinite frequency'
  return frequency === 0 ? 'zero frequency' : `${formatSignificant(frequency, 3)} ${unit}`
}

/** A distance to -1 as a sounding: 0.44, 0.098. */
export function soundingWords(distance: number): string {
  return distance < 0.095 ? formatSignificant(distance, 2) : formatFixed(distance, 2)
}

/** Whether margins may be told of the loop: one that is not stable has none. */
export function hasMargins(analysis: LoopAnalysis): boolean {
  return analysis.stability.verdict === 'stable'
}

function distanceWords(distance: number | undefined): string {
  return distance === undefined ? '' : `distance to −1 ${formatSignificant(distance, 3)}`
}

function sentence(parts: string[]): string {
  return parts.filter(part => part !== '').join(', ')
}

/** What a mark says to one who cannot see it; of a loop that is not stable only the distance to -1. */
export function gainCrossoverWords(crossing: GainCrossover, unit: FrequencyUnit, margins: boolean): string {
  return sentence([`gain crossover at ${frequencyWords(crossing.frequency, unit)}`, crossing.slope,
    margins ? phaseMarginWords(crossing.phaseMargin) : distanceWords(crossing.distance)])
}

export function phaseCrossoverWords(crossing: PhaseCrossover, unit: FrequencyUnit, margins: boolean): string {
  return sentence([`phase crossover at ${frequencyWords(crossing.frequency, unit)}`,
    margins ? gainMarginWords(crossing.gainMargin) : distanceWords(crossing.distance)])
}

export function approachWords(approach: ClosestApproach, unit: FrequencyUnit, margins: boolean): string {
  return sentence([`closest approach ${formatSignificant(approach.distance, 3)} at ${frequencyWords(approach.frequency, unit)}`,
    margins ? `one change that reaches −1: ${changeWords(approach)}` : ''])
}
