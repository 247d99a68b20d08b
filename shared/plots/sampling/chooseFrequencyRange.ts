import type { LoopGain } from '../../analysis/LoopGain'
import type { LoopAnalysis } from '../../types/analysis'
import { rangeOfFeatures } from './rangeOfFeatures'
import { roundDown, roundUp } from './roundFrequency'

export interface FrequencyRange {
  from: number
  to: number
}

/** More crossings than this need no wide context: their spacing shows the trend. */
const crowd = 24

/**
 * The range of frequency in which to draw a loop, in the unit of the analysis: every crossing and closest approach, with a decade of context
 * on either side of those where |L| is within 30 dB of one (less where there are very many), within the axis of the loop gain (up to pi/T of a sampled loop). A measured loop is drawn over the band of its data.
 * Without any crossing the features of the loop gain are shown, and a loop without those from 0.1 to 10.
 */
export function chooseFrequencyRange(analysis: LoopAnalysis, gain: LoopGain): FrequencyRange {
  const unit = analysis.frequencyUnit === 'Hz' ? 2 * Math.PI : 1
  if (gain.axisStart > 0 && Number.isFinite(gain.axisEnd)) return { from: gain.axisStart / unit, to: gain.axisEnd / unit }

  const { all, telling } = listedFrequencies(analysis)
  if (all.length === 0) return rangeOfFeatures(gain, unit)
  const context = telling.length > crowd ? 2 : 10
  const low = roundDown(Math.min(least(all) / 2, least(telling) / context))
  const high = roundUp(Math.max(greatest(all) * (all.length > crowd ? 1.2 : 2), greatest(telling) * context))
  return { from: Math.max(low, gain.axisStart / unit), to: Math.min(high, gain.axisEnd / unit) }
}

/** Frequencies of all crossings and approaches, and of those that tell something: with |L| near enough to one to move a margin. */
function listedFrequencies(analysis: LoopAnalysis): { all: number[], telling: number[] } {
  const all: number[] = []
  const telling: number[] = []
  const add = (frequency: number | 'infinity', tells: boolean) => {
    if (typeof frequency !== 'number' || frequency <= 0) return
    all.push(frequency)
    if (tells) telling.push(frequency)
  }
  for (const { frequency } of analysis.gainCrossovers) add(frequency, true)
  for (const { frequency, gainMargin } of analysis.phaseCrossovers) add(frequency, Math.abs(gainMargin) < 30)
  for (const { frequency, distance } of analysis.closestApproaches) add(frequency, distance < 0.97)
  return { all, telling }
}

const least = (values: readonly number[]) => values.reduce((a, b) => Math.min(a, b), Infinity)
const greatest = (values: readonly number[]) => values.reduce((a, b) => Math.max(a, b), 0)
