import type { LoopAnalysis, LoopInput } from '../types/analysis'
import { AnalysisInputError } from './AnalysisInputError'
import { analyseFactored } from './analyseFactored'
import { atMeasuredBlock } from './blocks/atMeasuredBlock'
import { measuredInputOf } from './blocks/measuredInputOf'
import { withAccuracy } from './blocks/withAccuracy'
import { analyseGeneralLoop } from './expressions/analyseGeneralLoop'
import { evaluateGeneralLoop } from './expressions/evaluateGeneralLoop'
import { lowerExpression } from './expressions/lowerExpression'
import { factorsOfInput } from './factorsOfInput'
import { analyseMeasured } from './measured/analyseMeasured'
import { prepareFactoredGain } from './prepareFactoredGain'
import { withApproximation } from './sampling/withApproximation'

/**
 * The complete analysis of one loop: every gain and phase crossover, every closest approach to -1, the vector margin, the closed-loop verdict,
 * the summary of margins, and what of it is proven. Pure: the same input gives the same result anywhere.
 * Frequencies in and out are in the input's unit; conventions in README.md of this folder.
 *
 * @throws AnalysisInputError where the input cannot be analysed; `readLoopInput` makes a LoopInput of unknown data
 */
export function analyseLoop(input: LoopInput): LoopAnalysis {
  if ('numerator' in input || 'zeros' in input) return analyseFactored(factorsOfInput(input), input)
  const measured = measuredInputOf(input)
  if (measured) {
    const analysis = atMeasuredBlock(measured, () => analyseMeasured(measured.input))
    return measured.structure ? { ...analysis, structure: measured.structure } : analysis
  }
  if ('expression' in input) {
    const lowered = lowerExpression(input)
    const analysis = lowered.kind === 'factored' ? analyseFactored(lowered.loop, input) : analyseGeneralLoop(lowered.loop, input)
    if (!lowered.structure) return analysis
    return withApproximation(withAccuracy({ ...analysis, structure: lowered.structure }), input,
      () => lowered.kind === 'factored' ? prepareFactoredGain(lowered.loop) : evaluateGeneralLoop(lowered.loop))
  }
  throw new AnalysisInputError('This source form is not analysed yet.', 'expression')
}
