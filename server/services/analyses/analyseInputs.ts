import type { AnalysisFailure, LoopAnalysis, LoopInput } from '#shared/types/analysis'
import type { OpenContext } from '../context'
import { runEngine } from './runEngine'

export type InputResult = LoopAnalysis | AnalysisFailure

/** What the engine says of each input, in their order. */
export const analyseInputs = (inputs: readonly LoopInput[], context: OpenContext): Promise<InputResult[]> => runEngine('analysis', inputs, context)
