import type { WithDerivative } from './aberthRoots'
import { evaluateFixedPoint } from './evaluateFixedPoint'
import type { ExactPolynomial } from './ExactPolynomial'
import { ScaledPolynomial } from './ScaledPolynomial'

/** Evaluation of a polynomial and its derivative in fixed point with 4 bits a degree and 128 more, for `aberthRoots`. */
export function preciseEvaluation(exact: ExactPolynomial): WithDerivative {
  const n = exact.coefficients.length - 1
  const bits = 64 * Math.ceil((4 * n + 128) / 64)
  const derivative = ScaledPolynomial.fromExact({
    coefficients: exact.coefficients.slice(1).map((coefficient, k) => coefficient * BigInt(k + 1)),
    exponent: exact.exponent,
  })
  const slope = new Float64Array(2)
  return (polynomial, shift, a, b, out) => {
    evaluateFixedPoint(polynomial, shift, a, b, bits, out)
    evaluateFixedPoint(derivative, shift, a, b, bits, slope)
    // P' 2^shift over the scale of P
    const unit = 2 ** (derivative.at(shift).scale + shift - polynomial.at(shift).scale)
    out[2] = slope[0]! * unit
    out[3] = slope[1]! * unit
    return Math.hypot(out[0]!, out[1]!) < 2 ** (16 + n - bits)
  }
}
