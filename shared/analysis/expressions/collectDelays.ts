import { bitLength } from '../../numeric/extended/bitLength'
import { Rational } from '../../numeric/extended/Rational'
import type { DelayedPolynomial, FactorMap } from './ExactLoop'
import { expressionLimits } from './expressionLimits'
import { FactorProduct } from './FactorProduct'

/** Dead times are one and the same when they differ by no more than rounding of their sums. */
const SAME_DELAY = 10n ** 15n

/**
 * Terms brought together by dead time, shortest first: terms of one dead time are added up exactly, those that cancel are dropped.
 *
 * @throws RangeError beyond the limits on degree, digits and number of dead times
 */
export function collectDelays(terms: DelayedPolynomial[]): DelayedPolynomial[] {
  const ordered = terms.slice().sort((a, b) => a.delay.minus(b.delay).sign)
  const collected: (DelayedPolynomial | null)[] = []
  let delay: Rational | null = null
  for (const term of ordered) {
    const last = collected[collected.length - 1]
    if (delay && sameDelay(delay, term.delay)) {
      collected[collected.length - 1] = last ? addTerms(last, term) : { ...term, delay }
    }
    else {
      collected.push(term)
      delay = term.delay
    }
  }
  const kept = collected.filter(term => term !== null)
  if (kept.length > expressionLimits.delays) throw new RangeError(`more than ${expressionLimits.delays} different dead times in one sum`)
  return kept
}

function sameDelay(a: Rational, b: Rational): boolean {
  const left = a.numerator * b.denominator
  const right = b.numerator * a.denominator
  const difference = left > right ? left - right : right - left
  const size = left > 0n ? left : -left
  return difference * SAME_DELAY <= size
}

/** Sum of two polynomials of the same dead time; null where they cancel. */
function addTerms(a: DelayedPolynomial, b: DelayedPolynomial): DelayedPolynomial | null {
  const shared = FactorProduct.common(a.factors, b.factors)
  const [first, second] = [FactorProduct.without(a.factors, shared), FactorProduct.without(b.factors, shared)]
  const [left, right] = [expand(first), expand(second)]
  // over one denominator: the sum's coefficients stay integers
  const leftScale = a.scale.numerator * b.scale.denominator
  const rightScale = b.scale.numerator * a.scale.denominator
  const coefficients = Array.from({ length: Math.max(left.length, right.length) }, (_, k) =>
    leftScale * (left[k] ?? 0n) + rightScale * (right[k] ?? 0n))
  while (coefficients.length > 0 && coefficients[coefficients.length - 1] === 0n) coefficients.pop()
  if (coefficients.length === 0) return null
  if (coefficients.some(coefficient => bitLength(coefficient) > expressionLimits.bits)) {
    throw new RangeError('its exact coefficients have too many digits')
  }
  const { scale, factors } = FactorProduct.of(coefficients, [first, second].some(isWorkedOut))
  return {
    scale: scale.over(Rational.of(a.scale.denominator * b.scale.denominator, 1n)),
    factors: FactorProduct.times(shared, factors),
    delay: a.delay,
  }
}

/** Whether the coefficients of a term are others than those typed: a product was multiplied out. */
function isWorkedOut(factors: FactorMap): boolean {
  let polynomials = 0
  for (const { coefficients, power } of factors.values()) if (coefficients.some((value, k) => value !== 0n && k < coefficients.length - 1)) polynomials += power
  return polynomials > 1 || FactorProduct.holdsPrecise(factors)
}

function expand(factors: FactorMap): bigint[] {
  if (FactorProduct.degree(factors) > expressionLimits.expandedDegree) {
    throw new RangeError(`a polynomial of degree above ${expressionLimits.expandedDegree} would have to be multiplied out`)
  }
  return FactorProduct.expanded(factors)
}
