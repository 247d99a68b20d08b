import { AnalysisInputError } from '../AnalysisInputError'
import { lowerExpression } from './lowerExpression'
import { parseExpression, type ExpressionNames } from './parseExpression'

export interface ExpressionProblem {
  message: string
  /** Character (from 0) where it stands. */
  position: number
}

/**
 * What is wrong with an expression as far as typed; an empty list when it can be analysed. Without `parameters` only the form
 * is checked, with their values also what depends on them: improper parts, dead times below zero.
 */
export function checkExpression(text: string, names: ExpressionNames, parameters?: Readonly<Record<string, number>>): ExpressionProblem[] {
  try {
    parseExpression(text, names)
    if (parameters) {
      lowerExpression({ expression: text, parameters: { ...parameters }, ...(names.variable === 'z' ? { sampleTime: 1 } : {}) })
    }
    return []
  }
  catch (error) {
    if (error instanceof AnalysisInputError) return [{ message: error.message, position: error.position ?? 0 }]
    throw error
  }
}
