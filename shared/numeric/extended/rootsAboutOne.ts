import { aberthRoots, evaluateWithDerivative, type WithDerivative } from './aberthRoots'
import type { ExactPolynomial } from './ExactPolynomial'
import { initialRoots } from './initialRoots'
import { ScaledPolynomial } from './ScaledPolynomial'

/** Nearer to 1 than this the polynomial is evaluated in powers of x - 1. */
const REACH = 0.5

/**
 * Starting points of all roots of a polynomial most of whose roots crowd about 1, as those of a system sampled fast do: in powers of x they are lost to cancellation,
 * in powers of x - 1, into which the exact coefficients go without rounding, they lie apart. Null where 1 itself is a root; 0 may be none.
 */
export function rootsAboutOne(exact: ExactPolynomial): { re: Float64Array, im: Float64Array } | null {
  const polynomial = ScaledPolynomial.fromExact(exact)
  const about = shiftByOne(exact.coefficients)
  if (about[0] === 0n) return null
  const shifted = ScaledPolynomial.fromExact({ coefficients: about, exponent: exact.exponent })
  const evaluate: WithDerivative = (own, shift, a, b, out) => {
    const scale = 2 ** shift
    const x = a * scale - 1
    const y = b * scale
    const distance = Math.hypot(x, y)
    if (!(distance < REACH) || distance === 0) return evaluateWithDerivative(own, shift, a, b, out)
    const near = Math.round(Math.log2(distance))
    const noise = evaluateWithDerivative(shifted, near, x * 2 ** -near, y * 2 ** -near, out)
    const unit = 2 ** (shift - near)
    out[2] = (out[2] as number) * unit
    out[3] = (out[3] as number) * unit
    return noise
  }
  const start = initialRoots(shifted)
  for (let k = 0; k < start.re.length; k++) start.re[k] = (start.re[k] as number) + 1
  return aberthRoots(polynomial, evaluate, start)
}

/** Coefficients in powers of x - 1. */
function shiftByOne(coefficients: bigint[]): bigint[] {
  const shifted = coefficients.slice()
  for (let k = 0; k < shifted.length - 1; k++) {
    for (let j = shifted.length - 2; j >= k; j--) shifted[j] = (shifted[j] as bigint) + (shifted[j + 1] as bigint)
  }
  return shifted
}
