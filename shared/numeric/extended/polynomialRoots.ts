import { aberthRoots } from './aberthRoots'
import type { ExactPolynomial } from './ExactPolynomial'
import { preciseEvaluation } from './preciseEvaluation'
import { refineRoots, type RefinedRoots } from './refineRoots'
import { ScaledPolynomial } from './ScaledPolynomial'
import { squareFreeFactors } from './squareFreeFactors'

/**
 * All roots of a real polynomial (degree at least 0, leading coefficient not zero) as doubles exact to the last bit or so of each part,
 * with the proven bound W_k of `RefinedRoots`: relative error of the product of factors at v at most sum W_k / |v - r_k|.
 * Roots at zero are exact and come first; roots of exact multiplicity m are listed m times; conjugate pairs are exact.
 *
 * @throws RangeError when distinct roots lie closer together than doubles can hold, or outside the range of doubles
 */
export function polynomialRoots(polynomial: ExactPolynomial): RefinedRoots {
  const { coefficients, exponent } = polynomial
  let atZero = 0
  while (coefficients[atZero] === 0n) atZero++
  const rest = atZero === 0 ? coefficients : coefficients.slice(atZero)
  const n = coefficients.length - 1
  const result = { re: new Float64Array(n), im: new Float64Array(n), correction: new Float64Array(n) }
  if (rest.length === 1) return result
  let index = atZero
  for (const factor of squareFreeFactors(rest)) {
    const roots = simpleRoots({ coefficients: factor.coefficients, exponent })
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

function simpleRoots(exact: ExactPolynomial): RefinedRoots {
  const scaled = ScaledPolynomial.fromExact(exact)
  const start = aberthRoots(scaled)
  for (let k = 0; k < start.re.length; k++) {
    const size = Math.max(Math.abs(start.re[k] as number), Math.abs(start.im[k] as number))
    if (!(size > 1e-290 && size < 1e290)) throw new RangeError('a root lies outside the range of numbers that can be held')
  }
  try {
    return refineRoots(scaled, start)
  }
  catch (error) {
    if (!(error instanceof RangeError)) throw error
    // Of high orders doubles may see nothing of the roots: the same iteration with as many bits as the coefficients have, and once more.
    return refineRoots(scaled, aberthRoots(scaled, preciseEvaluation(exact)))
  }
}
