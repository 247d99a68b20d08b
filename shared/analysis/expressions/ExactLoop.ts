import type { Rational } from '../../numeric/extended/Rational'
import type { ComplexPair } from '../../types/analysis'

/** An integer polynomial of degree at least 1, primitive, leading coefficient positive, lowest power first; `power` is at least 1. */
export interface PolynomialFactor {
  coefficients: bigint[]
  power: number
  /** its roots where they, and not the coefficients, were given: they are taken as exact */
  roots?: readonly ComplexPair[]
  /**
   * Its coefficients were worked out and not typed: they know more of its roots than doubles would. Then a root is on the stability boundary only
   * where it lies there, not where coefficients rounded to doubles could not tell (`snapToBoundary`).
   */
  precise?: true
  /** The blocks it comes from and whether it stands in z; not known where it was typed in the loop's own expression. */
  origin?: FactorOrigin
}

export interface FactorOrigin {
  blocks: readonly string[]
  sampled: boolean
}

/** Polynomial factors by their coefficients written out. */
export type FactorMap = ReadonlyMap<string, PolynomialFactor>

/** scale * product of factors * exp(-s delay): one term of a sum of different dead times. */
export interface DelayedPolynomial {
  scale: Rational
  factors: FactorMap
  delay: Rational
}

/**
 * A sum of polynomials with different dead times, free of poles: at least two terms, delays rising from 0, no factor common to all.
 */
export interface DelayedSum {
  key: string
  terms: DelayedPolynomial[]
}

/**
 * A loop gain held exactly as a product:
 *   scale * numerator * inverted / denominator * exp(-s delay) * product of sums[i].sum ^ sums[i].power
 *
 * Factors are kept as they were typed, nothing cancels between numerator and denominator: a pole that is typed and
 * cancelled is a hidden mode of the loop. Only `inverted`, the denominators of sums that were divided by (the poles of G in
 * G/(1+G*H)), cancel with what they are multiplied by, because there the pole is no pole of the whole.
 */
export interface ExactLoop {
  scale: Rational
  delay: Rational
  numerator: FactorMap
  denominator: FactorMap
  inverted: FactorMap
  /** Keys of the factors of the denominator that stand there as the common denominator of a sum. */
  common: ReadonlySet<string>
  sums: ReadonlyMap<string, { sum: DelayedSum, power: number }>
}
