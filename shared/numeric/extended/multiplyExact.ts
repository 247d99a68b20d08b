import type { ExactPolynomial } from './ExactPolynomial'

/** Product of two exact polynomials. */
export function multiplyExact(a: ExactPolynomial, b: ExactPolynomial): ExactPolynomial {
  const coefficients = new Array<bigint>(a.coefficients.length + b.coefficients.length - 1).fill(0n)
  a.coefficients.forEach((x, i) => {
    if (x === 0n) return
    b.coefficients.forEach((y, j) => {
      coefficients[i + j] = (coefficients[i + j] as bigint) + x * y
    })
  })
  return { coefficients, exponent: a.exponent + b.exponent }
}
