import { Rational } from '../../../numeric/extended/Rational'
import type { FactorMap } from '../../expressions/ExactLoop'
import { FactorProduct } from '../../expressions/FactorProduct'

/** A polynomial as a number times a product of primitive integer ones. */
export interface ScaledFactors {
  scale: Rational
  factors: FactorMap
}

/** The polynomial with these exact coefficients, lowest power first; null where it is zero. */
export function scaledPolynomial(ascending: readonly Rational[]): ScaledFactors | null {
  let length = ascending.length
  while (length > 0 && ascending[length - 1]!.sign === 0) length--
  if (length === 0) return null
  const used = ascending.slice(0, length)
  let common = Rational.one
  for (const { denominator } of used) {
    // the least common multiple: what the next denominator lacks in the one so far
    const missing = Rational.of(denominator, common.numerator).numerator
    common = Rational.of(common.numerator * missing, 1n)
  }
  const { scale, factors } = FactorProduct.of(used.map(value => value.numerator * (common.numerator / value.denominator)))
  return { scale: scale.over(common), factors }
}

/** The same of doubles, highest power first. */
export function scaledPolynomialOfDoubles(descending: readonly number[]): ScaledFactors | null {
  return scaledPolynomial(descending.map(value => Rational.fromDouble(value)).reverse())
}
