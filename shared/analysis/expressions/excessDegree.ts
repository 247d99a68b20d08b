import type { DelayedSum, ExactLoop } from './ExactLoop'
import { FactorProduct } from './FactorProduct'

/** Growth of |L| along the axis towards high frequency as a power of the frequency: degree of the numerator less that of the denominator. */
export function excessDegree(loop: ExactLoop): number {
  let excess = FactorProduct.degree(loop.numerator) + FactorProduct.degree(loop.inverted) - FactorProduct.degree(loop.denominator)
  for (const { sum, power } of loop.sums.values()) excess += power * sumDegree(sum)
  return excess
}

/** The highest degree of the polynomials of a sum. */
function sumDegree(sum: DelayedSum): number {
  return Math.max(...sum.terms.map(term => FactorProduct.degree(term.factors)))
}
