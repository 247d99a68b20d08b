import type { LoopGain } from '../analysis/LoopGain'
import type { LoopAnalysis, LoopInput } from '../types/analysis'
import type { CurveSource } from './buildLoopFigureData'

/** What an analysed loop hands to its figures: with the frequencies of the measured points and the sample time where it has them. */
export function curveSourceOf(name: string, input: LoopInput, analysis: LoopAnalysis, gain: LoopGain): CurveSource {
  const sampleFrequencies = measuredFrequencies(input, analysis)
  const sampleTime = analysis.structure?.sampleTime ?? ('sampleTime' in input ? input.sampleTime : undefined)
  return {
    name, analysis, gain,
    ...sampleFrequencies !== null && { sampleFrequencies },
    ...sampleTime !== undefined && { sampleTime },
  }
}

/** In the analysis' unit; a loop built from blocks is measured where one of them is, at that block's points. */
function measuredFrequencies(input: LoopInput, analysis: LoopAnalysis): number[] | null {
  if ('measured' in input) return input.measured.points.map(point => point.frequency)
  if (!('expression' in input) || analysis.samples === undefined) return null
  const measured = Object.values(input.blocks ?? {}).find(block => block.kind === 'measured')
  return measured === undefined ? null : measured.points.map(point => point.frequency)
}
