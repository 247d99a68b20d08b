import { aberthRoots, evaluateWithDerivative, type WithDerivative } from './aberthRoots'
import type { ExactPolynomial } from './ExactPolynomial'
import { initialRoots } from './initialRoots'
import { preciseEvaluation } from './preciseEvaluation'
import { refineRoots, type RefinedRoots } from './refineRoots'
import { ScaledPolynomial } from './ScaledPolynomial'

/** Nearer to 1 than this the polynomial is evaluated in powers of x - 1. */
const REACH = 0.5

/**
 * All roots, all simple, of a polynomial most of whose roots crowd about 1, as those of a system sampled fast do: in powers of x they are lost to cancellation,
 * in powers of x - 1, into which the exact coefficients go without rounding, they lie apart. The roots are doubles x with x - 1 a double too, so that their proven
 * bounds, found in powers of x - 1, hold. Null where 1 itself is a root; 0 may be none.
 *
 * @throws RangeError when roots cannot be told apart
 */
export function rootsAboutOne(exact: ExactPolynomial): RefinedRoots | null {
  const coefficients = shiftByOne(exact.coefficients)
  if (coefficients[0] === 0n) return null
  const shifted = ScaledPolynomial.fromExact({ coefficients, exponent: exact.exponent })
  const start = startingPoints(ScaledPolynomial.fromExact(exact), shifted)
  if (!start.re.every(Number.isFinite) || !start.im.every(Number.isFinite)) return null
  for (let k = 0; k < start.re.length; k++) start.re[k] = (start.re[k] as number) - 1
  const { re, im, correction } = refined(shifted, start)
  for (let k = 0; k < re.length; k++) {
    const root = 1 + (re[k] as number)
    // exact unless the root is far beyond 1
    const rounding = Math.abs((root - 1) - (re[k] as number)) + Math.abs((root - (root - 1)) - 1)
    re[k] = root
    correction[k] = (correction[k] as number) + rounding * (1 + 1e-9)
  }
  return { re, im, correction }
}

const onto = (value: number) => (1 + value) - 1

/** From these starting points, or, where doubles see nothing of the roots, from those of as many bits as the coefficients have. */
function refined(shifted: ScaledPolynomial, start: { re: Float64Array, im: Float64Array }): RefinedRoots {
  try {
    return refineRoots(shifted, start, onto)
  }
  catch (error) {
    if (!(error instanceof RangeError)) throw error
    return refineRoots(shifted, aberthRoots(shifted, preciseEvaluation(shifted.exact)), onto)
  }
}

/** Aberth's iteration in x, evaluated in powers of x - 1 near 1. */
function startingPoints(polynomial: ScaledPolynomial, shifted: ScaledPolynomial): { re: Float64Array, im: Float64Array } {
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
