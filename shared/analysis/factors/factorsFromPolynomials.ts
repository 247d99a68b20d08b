import type { ExactPolynomial } from '../../numeric/extended/ExactPolynomial'
import { polynomialRoots } from '../../numeric/extended/polynomialRoots'
import { ScaledPolynomial } from '../../numeric/extended/ScaledPolynomial'
import type { ComplexPair } from '../../types/analysis'
import { AnalysisInputError } from '../AnalysisInputError'
import type { FactorList } from '../FactoredLoop'
import { snapToBoundary } from './snapToBoundary'

/** An exact polynomial (leading coefficient not zero) that stands in a product as many times as `power` says. */
export interface PolynomialPower {
  polynomial: ExactPolynomial
  power: number
  /** its roots where they were given and are exact: they are not looked for */
  given?: readonly ComplexPair[] | undefined
  /** its coefficients were worked out, not typed: of the rules of the boundary only that of nearness applies */
  precise?: boolean | undefined
}

/**
 * The roots of a product of exact polynomials as one list of factors, each polynomial's roots found once, with the proven
 * correction of each and the boundary rule applied.
 *
 * @throws AnalysisInputError naming `path` when roots cannot be told apart or leave the range of doubles
 */
export function factorsFromPolynomials(parts: PolynomialPower[], sampled: boolean, path: string): FactorList {
  const lists = parts.map(({ polynomial, power, given, precise }) => ({ list: given ? givenFactors(given, sampled) : factorsOf(polynomial, sampled, path, precise === true), power }))
  const total = lists.reduce((sum, { list, power }) => sum + power * list.re.length, 0)
  const result = {
    re: new Float64Array(total),
    im: new Float64Array(total),
    correction: new Float64Array(total),
    onBoundary: new Uint8Array(total),
  }
  let offset = 0
  for (const { list, power } of lists) {
    for (let repeat = 0; repeat < power; repeat++, offset += list.re.length) {
      result.re.set(list.re, offset)
      result.im.set(list.im, offset)
      result.correction.set(list.correction, offset)
      result.onBoundary.set(list.onBoundary, offset)
    }
  }
  return result
}

function givenFactors(roots: readonly ComplexPair[], sampled: boolean): FactorList {
  const re = Float64Array.from(roots, root => root[0])
  return snapToBoundary({ re, im: Float64Array.from(roots, root => root[1]), correction: new Float64Array(re.length) }, sampled, null)
}

function factorsOf(polynomial: ExactPolynomial, sampled: boolean, path: string, precise: boolean): FactorList {
  try {
    return snapToBoundary(polynomialRoots(polynomial, sampled), sampled, precise ? null : ScaledPolynomial.fromExact(polynomial))
  }
  catch (error) {
    if (error instanceof RangeError) {
      throw new AnalysisInputError(`The roots of the ${path} cannot be found: ${error.message}.${path === 'expression' ? '' : ' Scale the coefficients or give zeros and poles.'}`, path)
    }
    throw error
  }
}
