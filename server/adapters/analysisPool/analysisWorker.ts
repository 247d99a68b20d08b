import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import { readLoopInput } from '#shared/analysis/readLoopInput'
import type { AnalysisFailure, LoopAnalysis } from '#shared/types/analysis'

/** What each thread of the pool runs: one entry of the contract in, its analysis or the reason why there is none out. */
export default function analyseEntry(value: unknown): LoopAnalysis | AnalysisFailure {
  try {
    return analyseLoop(readLoopInput(value))
  }
  catch (error) {
    if (!(error instanceof AnalysisInputError)) throw error
    return { error: { message: error.message, path: error.path } }
  }
}
