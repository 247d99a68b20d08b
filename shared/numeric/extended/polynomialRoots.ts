import { aberthRoots } from './aberthRoots'
import type { ExactPolynomial } from './ExactPolynomial'
import { preciseEvaluation } from './preciseEvaluation'
import { refineRoots, type RefinedRoots } from './refineRoots'
import { rootsAboutOne } from './rootsAboutOne'
import { ScaledPolynomial } from './ScaledPolynomial'
import { squareFreeFactors } from './squareFreeFactors'

/** From this degree on roots that crowd about 1 are looked for in powers of x - 1. */
const CROWD = 6

/**
 * All roots of a real polynomial (degree at least 0, leading coefficient not zero) as doubles exact to the last bit or so of each part,
 * with the proven bound W_k of `RefinedRoots`: relative error of the product of factors at v at most sum W_k / |v - r_k|.
 * Roots at zero are exact and come first; roots of exact multiplicity m are listed m times; conjugate pairs are exact.
 * `aboutOne`: many roots may lie close to 1, as those of a polynomial in z do; it only helps to find them.
 *
 * @throws RangeError when distinct roots lie closer together than doubles can hold, or outside the range of doubles
 */
export function polynomialRoots(polynomial: ExactPolynomial, aboutOne = false): RefinedRoots {
  const { coefficients, exponent } = polynomial
  let atZero = 0
  while (coefficients[atZero] === 0n) atZero++
  const rest = atZero === 0 ? coefficients : coefficients.slice(atZero)
  const n = coefficients.length - 1
  const result = { re: new Float64Array(n), im: new Float64Array(n), correction: new Float64Array(n) }
  if (rest.length === 1) return result
  let index = atZero
  for (const factor of squareFreeFactors(rest)) {
    const roots = simpleRoots({ coefficients: factor.coefficients, exponent }, aboutOne && factor.coefficients.length > CROWD)
    for (let k = 0; k < roots.re.length; k++) {
      for (let m = 0; m < factor.multiplicity; m++, index++) {
        result.re[index] = roots.re[k] as number
        result.im[index] = roots.im[k] as number
        result.correction[index] = roots.correction[k] as number
      }
    }
  }
  return result
}

function simpleRoots(exact: ExactPolynomial, aboutOne: boolean): RefinedRoots {
  const scaled = ScaledPolynomial.fromExact(exact)
  if (aboutOne) {
    try {
      const crowded = rootsAboutOne(exact)
      if (crowded) return crowded
    }
    catch (error) {
      // Not found this way: the usual one comes next, and tells if it finds none either.
      if (!(error instanceof RangeError)) throw error
    }
  }
  const start = aberthRoots(scaled)
  if (!isInRange(start)) throw new RangeError('a root lies outside the range of numbers that can be held')
  try {
    return refineRoots(scaled, start)
  }
  catch (error) {
    if (!(error instanceof RangeError)) throw error
    // Of high orders doubles may see nothing of the roots: the same iteration with as many bits as the coefficients have, and once more.
    return refineRoots(scaled, aberthRoots(scaled, preciseEvaluation(exact)))
  }
}

function isInRange({ re, im }: { re: Float64Array, im: Float64Array }): boolean {
  for (let k = 0; k < re.length; k++) {
    const size = Math.max(Math.abs(re[k] as number), Math.abs(im[k] as number))
    if (!(size > 1e-290 && size < 1e290)) return false
  }
  return true
}
