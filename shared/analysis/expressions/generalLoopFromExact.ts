import { Rational } from '../../numeric/extended/Rational'
import { AnalysisInputError } from '../AnalysisInputError'
import { factorsFromPolynomials } from '../factors/factorsFromPolynomials'
import type { DelayedPolynomial, ExactLoop } from './ExactLoop'
import { FactorProduct } from './FactorProduct'
import type { GeneralLoop, GeneralTerm } from './GeneralLoop'
import { leadOfTerm } from './leadOfTerm'
import { rationalPart } from './rationalPart'

/**
 * The sums of different dead times of an exact loop gain with their polynomials as factors.
 *
 * @throws AnalysisInputError where a sum that is divided by has a delayed term of higher degree than the one without dead time: an
 *   inner loop whose gain grows without bound has endlessly many unstable poles
 */
export function generalLoopFromExact(exact: ExactLoop, position: number): GeneralLoop {
  const numbers = new Map<string, number>()
  const polynomials: GeneralLoop['polynomials'] = []
  let gain = Rational.one
  const toTerm = (term: DelayedPolynomial, reference: Rational): GeneralTerm => {
    const factors = Array.from(term.factors, ([key, { coefficients, power, roots, precise }]) => {
      let polynomial = numbers.get(key)
      if (polynomial === undefined) {
        polynomial = polynomials.length
        numbers.set(key, polynomial)
        polynomials.push(factorsFromPolynomials([{ polynomial: { coefficients, exponent: 0 }, power: 1, given: roots, precise }], false, 'expression'))
      }
      return { polynomial, power }
    })
    return { gain: leadOfTerm(term).over(reference).toNumber(), factors, deadTime: term.delay.toNumber() }
  }
  const sums = Array.from(exact.sums.values(), ({ sum, power }) => {
    const degrees = sum.terms.map(term => FactorProduct.degree(term.factors))
    if (power < 0 && degrees.some(degree => degree > (degrees[0] as number))) {
      throw new AnalysisInputError('An inner loop of this expression has a gain that grows without bound and a dead time: it has endlessly many unstable poles.', 'expression', position)
    }
    // the first term's polynomial is made monic, its lead becomes part of the gain
    const reference = leadOfTerm(sum.terms[0] as DelayedPolynomial)
    gain = gain.times(reference.toPower(power))
    return { power, terms: sum.terms.map(term => toTerm(term, reference)) }
  })
  if (sums.some(sum => sum.terms.some(term => term.gain === 0 || !Number.isFinite(term.gain)))) {
    throw new AnalysisInputError('The gains inside the expression differ by more than doubles can hold.', 'expression', position)
  }
  return { rational: rationalPart(exact, undefined, gain), sums, polynomials, exact }
}
