import { Rational } from '../../numeric/extended/Rational'
import type { ExpressionInput } from '../../types/analysis'
import { AnalysisInputError } from '../AnalysisInputError'
import type { FactoredLoop } from '../FactoredLoop'
import { factorsFromPolynomials } from '../factors/factorsFromPolynomials'
import type { ExactLoop, FactorMap } from './ExactLoop'
import { exactLoopFromTree } from './exactLoopFromTree'
import { excessDegree } from './excessDegree'
import type { ExpressionNode } from './ExpressionNode'
import { FactorProduct } from './FactorProduct'
import type { GeneralLoop } from './GeneralLoop'
import { generalLoopFromExact } from './generalLoopFromExact'
import { hiddenModes } from './hiddenModes'
import { parseExpression } from './parseExpression'

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
  const rational = rationalPart(exact, input.sampleTime)
  const notes = hiddenModes(rational)
  if (exact.sums.size === 0) return { kind: 'factored', loop: rational, notes }
  return { kind: 'general', loop: generalLoopFromExact(exact, rational, tree.position), notes }
}

function rationalPart(exact: ExactLoop, sampleTime: number | undefined): FactoredLoop {
  const sampled = sampleTime !== undefined
  const numerator = FactorProduct.times(exact.numerator, exact.inverted)
  const gain = exact.scale.times(leadOf(numerator)).over(leadOf(exact.denominator)).toNumber()
  if (gain === 0 || !Number.isFinite(gain)) {
    throw new AnalysisInputError('The gain of the expression is beyond what doubles can hold.', 'expression', 0)
  }
  const roots = (factors: FactorMap) => factorsFromPolynomials(
    Array.from(factors.values(), ({ coefficients, power }) => ({ polynomial: { coefficients, exponent: 0 }, power })), sampled, 'expression')
  return {
    gain,
    zeros: roots(numerator),
    poles: roots(exact.denominator),
    deadTime: exact.delay.toNumber(),
    ...(sampled ? { sampleTime } : {}),
  }
}

function leadOf(factors: FactorMap): Rational {
  let lead = 1n
  for (const { coefficients, power } of factors.values()) lead *= (coefficients[coefficients.length - 1] as bigint) ** BigInt(power)
  return Rational.of(lead, 1n)
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
