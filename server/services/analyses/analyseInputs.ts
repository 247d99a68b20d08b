import type { AnalysisFailure, LoopAnalysis, LoopInput } from '#shared/types/analysis'
import type { OpenContext } from '../context'
import { runEngine } from './runEngine'

export type InputResult = LoopAnalysis | AnalysisFailure

/** What the engine says of each input, in their order. `keep`: whether new answers are stored. */
export const analyseInputs = (inputs: readonly LoopInput[], context: OpenContext, options: { keep?: boolean } = {}): Promise<InputResult[]> => runEngine('analysis', inputs, context, options)
