import type { ExpressionInput } from '../../types/analysis'
import { AnalysisInputError } from '../AnalysisInputError'
import { lowerExpression } from '../expressions/lowerExpression'
import type { FactoredLoop } from '../FactoredLoop'

/**
 * One channel of a block by itself as factors, in its own domain; null where it has none that stand alone: zero, a hold, a dead time in samples, several
 * dead times, a measured response.
 */
export function factorsOfReference(input: ExpressionInput, reference: string, sampleTime: number | undefined): FactoredLoop | null {
  const alone: ExpressionInput = { expression: reference, blocks: input.blocks ?? {}, ...input.parameters && { parameters: input.parameters } }
  // An expression in z may leave the sample time to its loop.
  const tries = sampleTime === undefined ? [alone] : [alone, { ...alone, sampleTime }]
  for (const attempt of tries) {
    try {
      const lowered = lowerExpression(attempt)
      return lowered.kind === 'factored' ? lowered.loop : null
    }
    catch (error) {
      // The loop as a whole has been analysed: what cannot stand alone is no fault.
      if (!(error instanceof AnalysisInputError)) throw error
    }
  }
  return null
}
