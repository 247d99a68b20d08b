import type { ExpressionInput } from '../../types/analysis'
import { AnalysisInputError } from '../AnalysisInputError'
import type { FactoredLoop } from '../FactoredLoop'
import { exactLoopFromTree } from './exactLoopFromTree'
import { excessDegree } from './excessDegree'
import type { ExpressionNode } from './ExpressionNode'
import type { GeneralLoop } from './GeneralLoop'
import { generalLoopFromExact } from './generalLoopFromExact'
import { hiddenModes } from './hiddenModes'
import { parseExpression } from './parseExpression'
import { rationalPart } from './rationalPart'

/** A loop gain as factors where it is rational times one dead time, or as a product with sums of several dead times. */
export type LoweredExpression
  = | { kind: 'factored', loop: FactoredLoop, notes: string[] }
    | { kind: 'general', loop: GeneralLoop, notes: string[] }

/**
 * Turns a typed loop gain into factors: sums over a common denominator, feedback forms and powers in exact arithmetic on the doubles
 * as given, products kept as products. Poles that are typed and cancelled by a zero stay in both lists; `notes` tells of those
 * beyond the stability boundary.
 *
 * @throws AnalysisInputError with path 'expression' and a position
 */
export function lowerExpression(input: ExpressionInput): LoweredExpression {
  const parameters = input.parameters ?? {}
  const sampled = input.sampleTime !== undefined
  const tree = parseExpression(input.expression, { variable: sampled ? 'z' : 's', parameterNames: Object.keys(parameters) })
  const exact = exactLoopFromTree(tree, parameters)
  if (exact === null) {
    throw new AnalysisInputError('The expression is zero: a loop gain of zero has no crossings to find.', 'expression', tree.position)
  }
  if (exact.delay.sign < 0) {
    throw new AnalysisInputError('Dead time below zero: the loop gain would look into the future.', 'expression', tree.position)
  }
  if (excessDegree(exact) > 0) {
    throw new AnalysisInputError(sampled
      ? 'Improper: this part has more zeros than poles, so the loop would need future samples.'
      : 'Improper: this part grows without bound towards high frequency. Add the poles that limit it.', 'expression', improperPosition(tree, parameters))
  }
  if (exact.sums.size === 0) {
    const loop = rationalPart(exact, input.sampleTime)
    return { kind: 'factored', loop, notes: hiddenModes(loop) }
  }
  const loop = generalLoopFromExact(exact, tree.position)
  return { kind: 'general', loop, notes: hiddenModes(loop.rational) }
}

/** The place of the smallest part that is improper by itself. */
function improperPosition(tree: ExpressionNode, parameters: Readonly<Record<string, number>>): number {
  if (tree.kind === 'negate') return improperPosition(tree.operand, parameters)
  if (tree.kind === 'add' || tree.kind === 'subtract') {
    for (const part of [tree.left, tree.right]) {
      const loop = exactLoopFromTree(part, parameters)
      if (loop && excessDegree(loop) > 0) return improperPosition(part, parameters)
    }
  }
  return tree.kind === 'divide' ? tree.left.position : tree.position
}
