import type { ExactPolynomial } from './ExactPolynomial'

/** Sum of two exact polynomials; an empty coefficient list is the zero polynomial. */
export function addExact(a: ExactPolynomial, b: ExactPolynomial): ExactPolynomial {
  if (a.coefficients.length === 0) return b
  if (b.coefficients.length === 0) return a
  const exponent = Math.min(a.exponent, b.exponent)
  const left = BigInt(a.exponent - exponent)
  const right = BigInt(b.exponent - exponent)
  const length = Math.max(a.coefficients.length, b.coefficients.length)
  const coefficients = Array.from({ length }, (_, k) =>
    ((a.coefficients[k] ?? 0n) << left) + ((b.coefficients[k] ?? 0n) << right))
  while (coefficients.length > 0 && coefficients[coefficients.length - 1] === 0n) coefficients.pop()
  return { coefficients, exponent }
}
