import { Rational } from '../../numeric/extended/Rational'
import type { DelayedPolynomial } from './ExactLoop'

/** Leading coefficient of a term's polynomial multiplied out, its scale included. */
export function leadOfTerm(term: DelayedPolynomial): Rational {
  let lead = term.scale
  for (const { coefficients, power } of term.factors.values()) {
    lead = lead.times(Rational.of((coefficients[coefficients.length - 1] as bigint) ** BigInt(power), 1n))
  }
  return lead
}
