import type { ExactPolynomial } from './ExactPolynomial'
import { splitDouble } from './splitDouble'

/**
 * The polynomial whose coefficients are exactly these finite doubles, lowest power first; trailing zeros (leading
 * coefficients) must have been removed.
 */
export function exactFromDoubles(ascending: ArrayLike<number>): ExactPolynomial {
  const parts = Array.from(ascending, splitDouble)
  const exponents = parts.filter(part => part.mantissa !== 0).map(part => part.exponent)
  const exponent = exponents.length > 0 ? Math.min(...exponents) : 0
  return {
    coefficients: parts.map(part => part.mantissa === 0 ? 0n : BigInt(part.mantissa) << BigInt(part.exponent - exponent)),
    exponent,
  }
}
