import { aberthStep } from './aberthStep'
import { initialRoots } from './initialRoots'
import type { ScaledPolynomial } from './ScaledPolynomial'

const MAXIMAL_SWEEPS = 120

/**
 * Writes P and P' by x at (a + jb) 2^shift, over a common scale, lengths over 2^shift, as [Re P, Im P, Re P', Im P']; true where P is below the
 * noise of the evaluation.
 */
export type WithDerivative = (polynomial: ScaledPolynomial, shift: number, a: number, b: number, out: Float64Array) => boolean

/**
 * All roots to about double precision of the coefficients, by the iteration of O. Aberth ('Iteration methods for finding
 * all zeros of a polynomial simultaneously', Mathematics of Computation 27, 1973), each root in its own scale; in plain doubles unless
 * another evaluation is given.
 * The constant coefficient must not be zero. The result is a starting point only: nothing is proven of it.
 */
export function aberthRoots(polynomial: ScaledPolynomial, evaluate: WithDerivative = evaluateWithDerivative, start = initialRoots(polynomial)): { re: Float64Array, im: Float64Array } {
  const n = polynomial.degree
  const at = new Float64Array(4)
  const step = new Float64Array(2)
  const { re, im } = start
  const settled = new Uint8Array(n)
  let open = n
  for (let sweep = 0; sweep < MAXIMAL_SWEEPS && open > 0; sweep++) {
    for (let k = 0; k < n; k++) {
      if (settled[k]) continue
      const x = re[k] as number
      const y = im[k] as number
      const shift = exponentOf(x, y)
      const scaling = 2 ** -shift
      const a = x * scaling
      const b = y * scaling
      const modulus = Math.sqrt(a * a + b * b)
      const noise = evaluate(polynomial, shift, a, b, at)
      const pr = at[0]!
      const pi = at[1]!
      if (pr * pr + pi * pi === 0) {
        settled[k] = 1
        open--
        continue
      }
      const length = aberthStep(re, im, k, scaling, at, step)
      re[k] = x - step[0]! * 2 ** shift
      im[k] = y - step[1]! * 2 ** shift
      // Below the noise of the evaluation a further step would be random.
      if (noise || length <= 1e-15 * modulus) {
        settled[k] = 1
        open--
      }
    }
  }
  return { re, im }
}

/** In plain doubles. */
export const evaluateWithDerivative: WithDerivative = (polynomial, shift, a, b, out) => {
  const c = polynomial.at(shift).high
  const n = polynomial.degree
  const modulus = Math.sqrt(a * a + b * b)
  let pr = c[n] as number
  let pi = 0
  let dr = 0
  let di = 0
  let size = Math.abs(pr)
  for (let j = n - 1; j >= 0; j--) {
    let t = dr * a - di * b + pr
    di = dr * b + di * a + pi
    dr = t
    t = pr * a - pi * b + (c[j] as number)
    pi = pr * b + pi * a
    pr = t
    size = size * modulus + Math.abs(c[j] as number)
  }
  out[0] = pr
  out[1] = pi
  out[2] = dr
  out[3] = di
  return Math.sqrt(pr * pr + pi * pi) <= 4e-16 * size
}

/** Power of two nearest to |x + j y|, so that the point divided by it lies in about [0.7, 1.5]. */
function exponentOf(x: number, y: number): number {
  return Math.round(Math.log2(Math.max(Math.abs(x), Math.abs(y), 1e-300)))
}
