import type { Rational } from '../../numeric/extended/Rational'
import type { HoldGain } from '../../types/block'

/** A hold by its block. */
export interface HoldBlock {
  name: string
  gain: HoldGain
}

/**
 * What can be done with a gain V in s or in z, however it is held: exactly (`exactAlgebra`) or by its values at some frequencies (`responseAlgebra`).
 * Values are never zero: a sum that is comes as null.
 */
export interface LoopAlgebra<V> {
  number: (value: Rational) => V
  /** s, or z */
  variable: (domain: 'continuous' | 'sampled') => V
  scale: (value: V, by: Rational) => V
  /** @throws RangeError when the result grows beyond the limits */
  add: (a: V, b: V) => V | null
  multiply: (a: V, b: V) => V
  invert: (value: V) => V
  /** To a whole power. */
  raise: (value: V, exponent: number) => V
  /** A continuous gain times exp(-s delay), delay in seconds. */
  delay: (value: V, delay: Rational) => V
  /** z^-count */
  unitDelays: (count: number) => V
  /** The sampled gain from the input of a hold to the samples of the output of the continuous gain behind it. */
  behindHold: (continuous: V, hold: HoldBlock) => V
  /** True for a sum of different dead times that is no product with one. */
  hasSeveralDelays: (value: V) => boolean
  /** Degree of the numerator less that of the denominator; null where it is not known. */
  excess: (value: V) => number | null
}
