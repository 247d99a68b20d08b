import type { FactorList, FactoredLoop } from '../FactoredLoop'
import type { ExactLoop } from './ExactLoop'

/** A polynomial of `GeneralLoop.polynomials`, by its number, and how often it stands in a product. */
export interface PolynomialUse {
  polynomial: number
  power: number
}

/** One term of a sum of different dead times: gain * prod (s - root) * exp(-s deadTime). */
export interface GeneralTerm {
  gain: number
  factors: PolynomialUse[]
  /** s, 0 for the first term of each sum */
  deadTime: number
}

/** An entire function of s raised to a power: a zero of it is a zero of L, or a pole where the power is negative. */
export interface GeneralSum {
  power: number
  terms: GeneralTerm[]
}

/**
 * A loop gain whose dead times do not come out as one factor:
 *   L(s) = rational(s) * product over i of sums[i](s) ^ power
 */
export interface GeneralLoop {
  rational: FactoredLoop
  sums: GeneralSum[]
  /** Roots of the polynomials that the terms are made of, each found once. */
  polynomials: FactorList[]
  /** The same without rounding. */
  exact: ExactLoop
}
