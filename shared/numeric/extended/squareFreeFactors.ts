import { divideExactly } from './divideExactly'
import { modularGcd } from './modularPolynomial'
import { polynomialGcd } from './polynomialGcd'
import { primitivePart } from './primitivePart'

/** A divisor with only simple roots, and how often it divides. */
export interface SquareFreeFactor {
  coefficients: bigint[]
  multiplicity: number
}

const CHECK_PRIME = 67_108_859 // the largest prime below 2^26

/**
 * Splits an integer polynomial (lowest power first, degree at least 1) by the multiplicity of its roots, exactly (D. R. Musser, 'Algorithms for
 * polynomial factorization', 1971). A check modulo one prime settles the usual case, all roots simple, at once.
 */
export function squareFreeFactors(coefficients: bigint[]): SquareFreeFactor[] {
  if (isSquareFreeModulo(coefficients)) return [{ coefficients, multiplicity: 1 }]
  const polynomial = primitivePart(coefficients)
  const derivative = polynomial.slice(1).map((coefficient, k) => coefficient * BigInt(k + 1))
  let repeated = polynomialGcd(polynomial, derivative)
  let distinct = quotientOf(polynomial, repeated)
  const factors: SquareFreeFactor[] = []
  for (let multiplicity = 1; distinct.length > 1; multiplicity++) {
    const shared = repeated.length > 1 ? polynomialGcd(distinct, repeated) : [1n]
    const factor = quotientOf(distinct, shared)
    if (factor.length > 1) factors.push({ coefficients: factor, multiplicity })
    repeated = quotientOf(repeated, shared)
    distinct = shared
  }
  return factors
}

/** True only when all roots are certainly simple: a common factor with the derivative would show modulo every such prime. */
function isSquareFreeModulo(coefficients: bigint[]): boolean {
  const prime = BigInt(CHECK_PRIME)
  const reduced = coefficients.map((coefficient) => {
    const rest = Number(coefficient % prime)
    return rest < 0 ? rest + CHECK_PRIME : rest
  })
  if (reduced[reduced.length - 1] === 0) return false
  const derivative = reduced.slice(1).map((coefficient, k) => (coefficient * (k + 1)) % CHECK_PRIME)
  return modularGcd(reduced, derivative, CHECK_PRIME).length === 1
}

function quotientOf(dividend: bigint[], divisor: bigint[]): bigint[] {
  const quotient = divideExactly(dividend, primitivePart(divisor))
  if (!quotient) throw new RangeError('the polynomial does not divide by its own factor')
  return quotient
}
