import type { BlockGain } from '../../types/block'
import { AnalysisInputError } from '../AnalysisInputError'
import { describeValue } from './describeValue'
import { inputLimits } from './inputLimits'
import { isGiven } from './isGiven'
import { readBlocks } from './readBlocks'
import { readNumber } from './readNumber'
import { readRecord } from './readRecord'
import { readTiming } from './readTiming'

export interface ExpressionSource {
  expression: string
  parameters?: Record<string, number>
  sampleTime?: number
  blocks?: Record<string, BlockGain>
}

const reserved = ['s', 'z', 'exp']

/**
 * Text, parameters and blocks of a loop given as an expression; the text itself is read by the expression parser.
 * @throws AnalysisInputError for empty or over-long text, and parameters that are no names with finite numbers.
 */
export function readExpression(record: Record<string, unknown>): ExpressionSource {
  const text = record.expression
  if (typeof text !== 'string') throw new AnalysisInputError(`expression must be text, not ${describeValue(text)}.`, 'expression')
  if (text.length > inputLimits.expressionLength) {
    throw new AnalysisInputError(`expression has ${text.length} characters; at most ${inputLimits.expressionLength} are read.`, 'expression')
  }
  if (text.trim() === '') throw new AnalysisInputError('expression is empty.', 'expression')
  const { sampleTime } = readTiming(record)
  const parameters = isGiven(record.parameters) ? readParameters(record.parameters) : undefined
  return {
    expression: text,
    ...(parameters && { parameters }),
    ...(isGiven(record.blocks) && { blocks: readBlocks(record.blocks, Object.keys(parameters ?? {})) }),
    ...(sampleTime !== undefined && { sampleTime }),
  }
}

function readParameters(value: unknown): Record<string, number> {
  const entries = Object.entries(readRecord(value, 'parameters', 'parameters'))
  if (entries.length > inputLimits.parameters) {
    throw new AnalysisInputError(`parameters holds ${entries.length} names; at most ${inputLimits.parameters} are read.`, 'parameters')
  }
  return Object.fromEntries(entries.map(([name, entry]) => {
    const path = `parameters.${name.slice(0, 60)}`
    if (!/^[a-z_]\w*$/i.test(name) || name === '__proto__') {
      throw new AnalysisInputError(`"${name.slice(0, 60)}" cannot name a parameter: use letters, digits and _, a letter first.`, path)
    }
    if (reserved.includes(name)) throw new AnalysisInputError(`"${name}" cannot name a parameter: it has its own meaning in an expression.`, path)
    return [name, readNumber(entry, path)]
  }))
}
