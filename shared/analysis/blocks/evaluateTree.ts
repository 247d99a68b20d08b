import { Rational } from '../../numeric/extended/Rational'
import { AnalysisInputError } from '../AnalysisInputError'
import type { BlockChannel, ExpressionNode } from '../expressions/ExpressionNode'
import type { LoopAlgebra } from './LoopAlgebra'
import type { LoopPart } from './LoopPart'
import type { PartArithmetic } from './PartArithmetic'

/** What the names in an expression stand for. */
export interface TreeScope<V> {
  algebra: LoopAlgebra<V>
  arithmetic: PartArithmetic<V>
  parameters: Readonly<Record<string, number>>
  /** s; undefined for a continuous loop */
  sampleTime: number | undefined
  /** @throws AnalysisInputError for a block or channel that does not exist */
  block: (name: string, channel: BlockChannel | null, position: number) => LoopPart<V> | null
}

/**
 * The gain of a checked expression as a product over its domains; null where it is zero.
 *
 * @throws AnalysisInputError with path 'expression' and the position of the part at fault: a parameter without a value, a division by zero, a
 *   dead time below zero, domains that do not go together, a result beyond the limits
 */
export function evaluateTree<V>(tree: ExpressionNode, scope: TreeScope<V>): LoopPart<V> | null {
  const { algebra, arithmetic } = scope
  const { position } = tree
  const evaluate = (node: ExpressionNode) => evaluateTree(node, scope)
  switch (tree.kind) {
    case 'constant': return arithmetic.number(Rational.fromDouble(tree.value))
    case 'parameter': return arithmetic.number(Rational.fromDouble(valueOf(tree.name, scope.parameters, position)))
    case 'variable': {
      if (tree.variable === 's') return arithmetic.continuous(algebra.variable('continuous'))
      if (scope.sampleTime === undefined) {
        throw new AnalysisInputError('This loop is continuous: its variable is s. Give a sample time for a loop in z.', 'expression', position)
      }
      return arithmetic.sampled(algebra.variable('sampled'))
    }
    case 'block': return scope.block(tree.name, tree.channel, position)
    case 'brackets': return arithmetic.brackets(evaluate(tree.content))
    case 'exponential': {
      const slope = slopeOf(tree.argument, scope)
      if (slope.sign > 0) {
        throw new AnalysisInputError('The argument of exp must be -s*T with a dead time T of at least 0; this one would look into the future.', 'expression', position)
      }
      return arithmetic.deadTime(slope.negated())
    }
    case 'negate': return arithmetic.negate(evaluate(tree.operand))
    case 'power': return arithmetic.raise(evaluate(tree.base), tree.exponent, position)
    case 'multiply': return arithmetic.multiply(evaluate(tree.left), evaluate(tree.right), position)
    case 'divide': {
      const dividend = evaluate(tree.left)
      return arithmetic.multiply(dividend, arithmetic.invert(evaluate(tree.right), position), position)
    }
    case 'add': return arithmetic.add(evaluate(tree.left), evaluate(tree.right), position)
    case 'subtract': {
      const minuend = evaluate(tree.left)
      return arithmetic.add(minuend, arithmetic.negate(evaluate(tree.right)), position)
    }
  }
}

/** The factor of s in an argument of exp, which is a multiple of s by its form. */
function slopeOf<V>(node: ExpressionNode, scope: TreeScope<V>): Rational {
  switch (node.kind) {
    case 'variable': return Rational.one
    case 'brackets': return slopeOf(node.content, scope)
    case 'negate': return slopeOf(node.operand, scope).negated()
    case 'power': return slopeOf(node.base, scope)
    case 'add': return slopeOf(node.left, scope).plus(slopeOf(node.right, scope))
    case 'subtract': return slopeOf(node.left, scope).minus(slopeOf(node.right, scope))
    case 'divide': return slopeOf(node.left, scope).times(scope.arithmetic.invert(evaluateTree(node.right, scope), node.right.position).number)
    case 'multiply': {
      const [linear, free] = holdsVariable(node.left) ? [node.left, node.right] : [node.right, node.left]
      return slopeOf(linear, scope).times(evaluateTree(free, scope)?.number ?? Rational.zero)
    }
    default: return Rational.zero
  }
}

function holdsVariable(node: ExpressionNode): boolean {
  switch (node.kind) {
    case 'variable': return true
    case 'negate': return holdsVariable(node.operand)
    case 'brackets': return holdsVariable(node.content)
    case 'power': return holdsVariable(node.base)
    case 'add':
    case 'subtract':
    case 'multiply':
    case 'divide': return holdsVariable(node.left) || holdsVariable(node.right)
    default: return false
  }
}

function valueOf(name: string, parameters: Readonly<Record<string, number>>, position: number): number {
  const value = Object.hasOwn(parameters, name) ? parameters[name] : undefined
  if (value === undefined) throw new AnalysisInputError(`The parameter "${name}" has no value.`, 'expression', position)
  if (!Number.isFinite(value)) throw new AnalysisInputError(`The parameter "${name}" is not a finite number.`, 'expression', position)
  return value
}
