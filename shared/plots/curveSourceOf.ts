import { measuredInputOf } from '../analysis/blocks/measuredInputOf'
import type { LoopGain } from '../analysis/LoopGain'
import { sampleTimeOfInput } from '../analysis/sampleTimeOfInput'
import type { LoopAnalysis, LoopInput } from '../types/analysis'
import type { CurveSource } from './buildLoopFigureData'

/** What an analysed loop hands to its figures: with the frequencies of the measured points and the sample time where it has them. */
export function curveSourceOf(name: string, input: LoopInput, analysis: LoopAnalysis, gain: LoopGain): CurveSource {
  const measured = measuredInputOf(input)
  const sampleTime = measured?.structure?.sampleTime ?? sampleTimeOfInput(input)
  return {
    name, analysis, gain,
    // in the analysis' unit; a loop built from blocks is measured where one of them is
    ...measured && { sampleFrequencies: measured.input.measured.points.map(point => point.frequency) },
    ...sampleTime !== undefined && { sampleTime },
  }
}
