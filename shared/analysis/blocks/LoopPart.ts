import type { Rational } from '../../numeric/extended/Rational'
import type { HoldBlock } from './LoopAlgebra'

/**
 * A product in an expression, not yet brought to one domain: number * sampled * hold * continuous * measured * exp(-s delay). Factors of each domain are collected
 * until the product ends in a sum or in the loop: only then it is known what stands behind the hold. A part that is zero is null.
 */
export interface LoopPart<V> {
  readonly number: Rational
  /** in z */
  readonly sampled: V | null
  /** in s */
  readonly continuous: V | null
  /** a measured response, which stands beside parts of either domain */
  readonly measured: V | null
  /** s; dead time that is not in `continuous` */
  readonly delay: Rational
  readonly hold: HoldBlock | null
  /** The hold stands with its own continuous part in brackets, or in a block of its own. */
  readonly closed: boolean
  /** A sum whose direct feedthrough cancels: dividing by it is an algebraic loop without a solution. */
  readonly noFeedthrough: boolean
}
