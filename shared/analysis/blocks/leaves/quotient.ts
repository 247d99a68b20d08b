import { Rational } from '../../../numeric/extended/Rational'
import type { ExactLoop } from '../../expressions/ExactLoop'
import { FactorProduct } from '../../expressions/FactorProduct'
import type { ScaledFactors } from './scaledPolynomial'

/** Numerator over denominator as a loop gain, nothing cancelled. */
export function quotient(numerator: ScaledFactors, denominator: ScaledFactors): ExactLoop {
  return {
    scale: numerator.scale.over(denominator.scale),
    delay: Rational.zero,
    numerator: numerator.factors,
    denominator: denominator.factors,
    inverted: FactorProduct.empty,
    common: new Set(),
    sums: new Map(),
  }
}
