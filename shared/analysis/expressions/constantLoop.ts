import { Rational } from '../../numeric/extended/Rational'
import type { ExactLoop } from './ExactLoop'
import { FactorProduct } from './FactorProduct'

/** A constant as a loop gain; null for zero. */
export function constantLoop(value: Rational): ExactLoop | null {
  if (value.sign === 0) return null
  return {
    scale: value,
    delay: Rational.zero,
    numerator: FactorProduct.empty,
    denominator: FactorProduct.empty,
    inverted: FactorProduct.empty,
    common: new Set(),
    sums: new Map(),
  }
}
