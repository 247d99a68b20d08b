import type { LoopInput } from '../types/analysis'
import { AnalysisInputError } from './AnalysisInputError'
import { atMeasuredBlock } from './blocks/atMeasuredBlock'
import { measuredInputOf } from './blocks/measuredInputOf'
import { evaluateGeneralLoop } from './expressions/evaluateGeneralLoop'
import { lowerExpression } from './expressions/lowerExpression'
import { factorsOfInput } from './factorsOfInput'
import type { LoopGain } from './LoopGain'
import { evaluateMeasured } from './measured/evaluateMeasured'
import { prepareFactoredGain } from './prepareFactoredGain'

/** The loop gain of an input, ready to be evaluated at any frequency (rad/s): what figures and tables sample. @throws AnalysisInputError */
export function prepareLoopGain(input: LoopInput): LoopGain {
  if ('numerator' in input || 'zeros' in input) return prepareFactoredGain(factorsOfInput(input))
  const measured = measuredInputOf(input)
  if (measured) return atMeasuredBlock(measured, () => evaluateMeasured(measured.input))
  if ('expression' in input) {
    const lowered = lowerExpression(input)
    return lowered.kind === 'factored' ? prepareFactoredGain(lowered.loop) : evaluateGeneralLoop(lowered.loop)
  }
  throw new AnalysisInputError('This source form is not evaluated yet.', 'expression')
}
