import { initialRoots } from '../../numeric/extended/initialRoots'
import { ScaledPolynomial } from '../../numeric/extended/ScaledPolynomial'
import type { ReturnDifferenceNumerator } from './ReturnDifferenceNumerator'
import { scaleOf, settleRoots } from './settleRoots'

/**
 * Roots of D + N with D and N left in factors, by Aberth's iteration (1973) in plain doubles, each with the radius of a disc about
 * it such that every root lies in the union of the discs. Null where the sum has a root at 0, or the iteration does not
 * settle: then the exact expansion has to do.
 */
export function closedLoopRoots(sum: ReturnDifferenceNumerator): { re: Float64Array, im: Float64Array, radius: Float64Array } | null {
  const n = sum.degree
  const sigma = sum.typicalSize()
  const rough = sum.roughCoefficients(sigma)
  if (rough[0] === 0 || !rough.every(value => Number.isFinite(value))) return null
  const { re, im } = initialRoots(ScaledPolynomial.fromDoubles(rough))
  for (let k = 0; k < n; k++) {
    re[k] = (re[k] as number) * sigma
    im[k] = (im[k] as number) * sigma
  }
  if (settleRoots(sum, re, im)) return { re, im, radius: discRadii(sum, re, im) }
  // where many lie at like distances from 0 the coefficients say little of them: then they are looked for from the poles of the loop gain
  const beside = sum.besidePoles()
  return settleRoots(sum, beside.re, beside.im) ? { ...beside, radius: discRadii(sum, beside.re, beside.im) } : null
}

/** n |W_k|, the evaluation's own error and that of the factors included (A. Neumaier, 'Enclosing clusters of zeros of polynomials', 2003). */
function discRadii(sum: ReturnDifferenceNumerator, re: Float64Array, im: Float64Array): Float64Array {
  const n = re.length
  const radius = new Float64Array(n)
  const out = new Float64Array(6)
  for (let k = 0; k < n; k++) {
    const x = re[k] as number
    const y = im[k] as number
    const scale = scaleOf(x, y)
    sum.evaluate(x, y, 1 / scale, out)
    let log = (out[5] as number) - Math.log2(Math.abs(sum.lead))
    for (let j = 0; j < n; j++) {
      if (j !== k) log -= Math.log2(Math.hypot(x - (re[j] as number), y - (im[j] as number)) / scale)
    }
    // each factor adds at most 4 units of 2^-53 to its product
    const value = Math.hypot(out[0] as number, out[1] as number) + 4 * (n + 4) * 2 ** -53 * (out[4] as number)
    const bound = n * (value * 2 ** log * scale * (1 + 1e-9) + sum.modelError(re, im, k))
    radius[k] = Number.isNaN(bound) ? Infinity : bound
  }
  return radius
}
