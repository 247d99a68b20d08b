import type { ExpressionInput, LoopAnalysis } from '../../types/analysis'
import { analyseAxisLoop } from '../analyseFactored'
import type { GeneralLoop } from './GeneralLoop'
import { generalAxisLoop } from './generalAxisLoop'

/**
 * The complete analysis of a loop gain with several dead times: the same proven search as for factors, with Taylor models of the sums
 * (see DelayedSumOnAxis). What cannot be shown is in `coverage.exceptions`.
 */
export function analyseGeneralLoop(loop: GeneralLoop, input: ExpressionInput): LoopAnalysis {
  return analyseAxisLoop(generalAxisLoop(loop), null, input)
}
