import { Rational } from '../../numeric/extended/Rational'
import { AnalysisInputError } from '../AnalysisInputError'
import { addLoops } from './addLoops'
import { constantLoop } from './constantLoop'
import type { ExactLoop } from './ExactLoop'
import type { ExpressionNode } from './ExpressionNode'
import { expressionLimits } from './expressionLimits'
import { FactorProduct } from './FactorProduct'
import { invertLoop } from './invertLoop'
import { multiplyLoops } from './multiplyLoops'
import { raiseLoop } from './raiseLoop'

/**
 * The loop gain of a checked expression in exact arithmetic on the doubles as given; null where it is zero.
 *
 * @throws AnalysisInputError with the position of the part at fault: a parameter without a value, a division by zero, a
 *   dead time below zero, a result beyond the limits
 */
export function exactLoopFromTree(tree: ExpressionNode, parameters: Readonly<Record<string, number>>): ExactLoop | null {
  switch (tree.kind) {
    case 'constant': return constantLoop(Rational.fromDouble(tree.value))
    case 'parameter': return constantLoop(Rational.fromDouble(valueOf(tree.name, parameters, tree.position)))
    case 'variable': {
      const one = constantLoop(Rational.one) as ExactLoop
      return { ...one, numerator: FactorProduct.of([0n, 1n]).factors }
    }
    case 'exponential': {
      const delay = exactLoopFromTree(tree.argument, parameters)
      const one = constantLoop(Rational.one) as ExactLoop
      if (delay === null) return one
      if (delay.scale.sign > 0) {
        throw new AnalysisInputError('The argument of exp must be -s*T with a dead time T of at least 0; this one would look into the future.', 'expression', tree.position)
      }
      return { ...one, delay: delay.scale.negated() }
    }
    case 'negate': {
      const operand = exactLoopFromTree(tree.operand, parameters)
      return operand && { ...operand, scale: operand.scale.negated() }
    }
    case 'power': {
      const base = exactLoopFromTree(tree.base, parameters)
      if (base === null) {
        if (tree.exponent > 0) return null
        if (tree.exponent === 0) return constantLoop(Rational.one)
        throw new AnalysisInputError('Division by zero.', 'expression', tree.position)
      }
      return bounded(tree.position, () => raiseLoop(base, tree.exponent))
    }
    default: {
      const left = exactLoopFromTree(tree.left, parameters)
      const right = exactLoopFromTree(tree.right, parameters)
      return bounded(tree.position, () => combine(tree.kind, left, right, tree.position))
    }
  }
}

function combine(kind: 'add' | 'subtract' | 'multiply' | 'divide', left: ExactLoop | null, right: ExactLoop | null, position: number): ExactLoop | null {
  if (kind === 'divide') {
    if (right === null) throw new AnalysisInputError('Division by zero.', 'expression', position)
    return left && multiplyLoops(left, invertLoop(right))
  }
  if (kind === 'multiply') return left && right && multiplyLoops(left, right)
  if (right === null) return left
  const second = kind === 'subtract' ? { ...right, scale: right.scale.negated() } : right
  return left === null ? second : addLoops(left, second)
}

/** Runs one step and refuses results beyond the limits, with the place. */
function bounded(position: number, step: () => ExactLoop | null): ExactLoop | null {
  try {
    const loop = step()
    if (loop) {
      const degree = Math.max(
        FactorProduct.degree(loop.numerator) + FactorProduct.degree(loop.inverted),
        FactorProduct.degree(loop.denominator),
      )
      if (degree > expressionLimits.degree) throw new RangeError(`its order would be ${degree}, at most ${expressionLimits.degree} is read`)
      if (loop.scale.bits > expressionLimits.bits) throw new RangeError('its numbers have too many digits')
    }
    return loop
  }
  catch (error) {
    if (error instanceof RangeError) throw new AnalysisInputError(`This part is too large to be worked out exactly: ${error.message}.`, 'expression', position)
    throw error
  }
}

function valueOf(name: string, parameters: Readonly<Record<string, number>>, position: number): number {
  const value = Object.hasOwn(parameters, name) ? parameters[name] : undefined
  if (value === undefined) throw new AnalysisInputError(`The parameter "${name}" has no value.`, 'expression', position)
  if (!Number.isFinite(value)) throw new AnalysisInputError(`The parameter "${name}" is not a finite number.`, 'expression', position)
  return value
}
