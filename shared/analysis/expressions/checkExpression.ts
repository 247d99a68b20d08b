import type { ExpressionInput } from '../../types/analysis'
import type { BlockGain } from '../../types/block'
import { AnalysisInputError } from '../AnalysisInputError'
import { measuredInputOf } from '../blocks/measuredInputOf'
import { sampleTimeOfInput } from '../sampleTimeOfInput'
import { lowerExpression } from './lowerExpression'
import { namesInExpression } from './namesInExpression'
import { parseExpression, type ExpressionNames } from './parseExpression'

export interface ExpressionProblem {
  message: string
  /** Character (from 0) where it stands. */
  position: number
}

/**
 * What is wrong with an expression as far as typed; an empty list when it can be analysed. Without `parameters` only the form
 * is checked, with their values also what depends on them: improper parts, dead times below zero. Of blocks given by name only the names are
 * checked; with their gains also channels, domains and whatever else stands in the way. A fault inside a block is told at the place where its name stands.
 */
export function checkExpression(text: string, names: ExpressionNames, parameters?: Readonly<Record<string, number>>): ExpressionProblem[] {
  try {
    parseExpression(text, names)
    const { blocks } = names
    if (parameters && !Array.isArray(blocks)) {
      const input: ExpressionInput = { expression: text, parameters: { ...parameters }, ...blocks && { blocks: blocks as Record<string, BlockGain> } }
      // nothing that is checked depends on how long a sample is, but for that of its blocks
      const checked = names.variable === 'z' ? { ...input, sampleTime: sampleTimeOfInput(input) ?? 1 } : input
      if (measuredInputOf(checked) === null) lowerExpression(checked)
    }
    return []
  }
  catch (error) {
    if (!(error instanceof AnalysisInputError)) throw error
    const { message, path, position } = error
    return [{ message, position: path === 'expression' ? position ?? 0 : positionOfBlock(text, path) }]
  }
}

/** Where the block of a path as in 'blocks.G.numerator' is named; the start where only another block names it. */
function positionOfBlock(text: string, path: string): number {
  const block = path.split('.')[1]
  return namesInExpression(text).find(({ name }) => name === block)?.position ?? 0
}
