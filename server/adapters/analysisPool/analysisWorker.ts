import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'
import { analyseEntries } from '#shared/analysis/analyseEntries'
import { findBuildFault } from '#shared/analysis/blocks/findBuildFault'
import { closedLoopPoles as listClosedLoopPoles } from '#shared/analysis/structure/closedLoopPoles'
import { compareSources, type ComparedSource } from '#shared/analysis/structure/compareSources'
import { shiftModes } from '#shared/analysis/structure/shiftModes'
import type { AnalysisFailure, LoopInput } from '#shared/types/analysis'
import type { BlockRole } from '#shared/types/block'

/** What each thread of the pool runs: one entry of the contract in, its analysis or the reason why there is none out. */
export default (value: unknown) => analyseEntries(value, { onFault: error => console.error('The engine broke off:', error) })

/** Inputs that were analysed before are asked these; a refusal is an answer, as of an analysis. */
function answering<Question, Answer>(answer: (question: Question) => Answer): (question: Question) => Answer | AnalysisFailure {
  return (question) => {
    try {
      return answer(question)
    }
    catch (error) {
      if (error instanceof AnalysisInputError) return { error: { message: error.message, path: error.path } }
      throw error
    }
  }
}

export const closedLoopPoles = answering(listClosedLoopPoles)
export const modeShifts = answering(({ input, roles }: { input: LoopInput, roles: Record<string, BlockRole> }) => shiftModes(input, roles))
export const sourceDifference = answering(({ reference, other }: { reference: ComparedSource, other: ComparedSource }) => compareSources(reference, other))
export const buildFault = findBuildFault
