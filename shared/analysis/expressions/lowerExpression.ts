import type { ExpressionInput, LoopStructure } from '../../types/analysis'
import { AnalysisInputError } from '../AnalysisInputError'
import { BlockScope } from '../blocks/BlockScope'
import { exactLeafSource } from '../blocks/exactLeafSource'
import { hiddenModeNotes } from '../blocks/hiddenModeNotes'
import type { FactoredLoop } from '../FactoredLoop'
import type { ExactLoop } from './ExactLoop'
import { differenceOfFactors } from './differenceOfFactors'
import { excessDegree } from './excessDegree'
import type { ExpressionNode } from './ExpressionNode'
import type { GeneralLoop } from './GeneralLoop'
import { generalLoopFromExact } from './generalLoopFromExact'
import { hiddenModes } from './hiddenModes'
import { rationalPart } from './rationalPart'

/**
 * A loop gain as factors where it is rational times one dead time, or as a product with sums of several dead times; `structure` where it was
 * built from blocks.
 */
export type LoweredExpression
  = | { kind: 'factored', loop: FactoredLoop, notes: string[], structure?: LoopStructure }
    | { kind: 'general', loop: GeneralLoop, notes: string[], structure?: LoopStructure }

/**
 * Turns a typed loop gain, its blocks with it, into factors: sums over a common denominator, feedback forms and powers in exact arithmetic on the
 * doubles as given, products kept as products. Poles that are typed and cancelled by a zero stay in both lists; `notes` tells of those
 * beyond the stability boundary.
 *
 * @throws AnalysisInputError with path 'expression' and a position, or with the path of the block at fault
 */
export function lowerExpression(input: ExpressionInput): LoweredExpression {
  const leaves = exactLeafSource()
  const scope = new BlockScope(input, leaves)
  const { tree, sampleTime } = scope
  const part = scope.evaluate()
  if (part === null) throw scope.zero()
  const { value: exact, domain } = scope.arithmetic.settle(part, tree.position)
  if (sampleTime !== undefined && domain === 'continuous') {
    throw new AnalysisInputError('The loop is sampled, but nothing in this expression is: put the hold before its continuous part, as in H0*G.', 'expression', tree.position)
  }
  refuseUnusable(exact, sampleTime, tree, scope)
  const accuracy = leaves.accuracy()
  const structure: LoopStructure | undefined = input.blocks && {
    ...sampleTime !== undefined && { sampleTime },
    ...accuracy && { accuracy },
    approximated: false,
    notes: leaves.notes,
  }
  if (exact.sums.size === 0) {
    const loop = rationalPart(exact, sampleTime)
    if (structure && structure.accuracy) structure.accuracy = withFactors(structure.accuracy, exact, loop)
    return withStructure({ kind: 'factored', loop, notes: hiddenModes(loop) }, loop)
  }
  const loop = generalLoopFromExact(exact, tree.position)
  return withStructure({ kind: 'general', loop, notes: hiddenModes(loop.rational) }, loop.rational)

  function withStructure(lowered: LoweredExpression, factors: FactoredLoop): LoweredExpression {
    return structure ? { ...lowered, structure: { ...structure, notes: [...structure.notes, ...hiddenModeNotes(factors, leaves.used)] } } : lowered
  }
}

/** The accuracy of the blocks with that of the factors found for the whole. */
function withFactors({ relative, basis }: NonNullable<LoopStructure['accuracy']>, exact: ExactLoop, loop: FactoredLoop): NonNullable<LoopStructure['accuracy']> {
  const { largest, frequencies } = differenceOfFactors(exact, loop)
  return { relative: relative + largest, basis: `${basis}, factors compared at ${frequencies === 1 ? 'one frequency' : `${frequencies} frequencies`}` }
}

function refuseUnusable(exact: ExactLoop, sampleTime: number | undefined, tree: ExpressionNode, scope: BlockScope<ExactLoop>): void {
  const sampled = sampleTime !== undefined
  if (exact.delay.sign < 0) {
    throw new AnalysisInputError('Dead time below zero: the loop gain would look into the future.', 'expression', tree.position)
  }
  if (excessDegree(exact) > 0) {
    throw new AnalysisInputError(sampled
      ? 'Improper: this part has more zeros than poles, so the loop would need future samples.'
      : 'Improper: this part grows without bound towards high frequency. Add the poles that limit it.', 'expression', improperPosition(tree, scope))
  }
}

/** The place of the smallest part that is improper by itself. */
function improperPosition(tree: ExpressionNode, scope: BlockScope<ExactLoop>): number {
  if (tree.kind === 'negate') return improperPosition(tree.operand, scope)
  if (tree.kind === 'brackets') return improperPosition(tree.content, scope)
  if (tree.kind === 'add' || tree.kind === 'subtract') {
    for (const side of [tree.left, tree.right]) {
      const part = scope.evaluate(side)
      if (part && excessDegree(scope.arithmetic.settle(part, side.position).value) > 0) return improperPosition(side, scope)
    }
  }
  return tree.kind === 'divide' ? tree.left.position : tree.position
}
