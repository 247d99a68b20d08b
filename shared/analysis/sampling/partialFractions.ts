import { ComplexArithmetic } from '../../numeric/extended/ComplexArithmetic'
import type { ComplexFloat } from '../../numeric/extended/ComplexFloat'
import type { Rational } from '../../numeric/extended/Rational'
import type { FactorMap } from '../expressions/ExactLoop'
import type { ContinuousPole } from './continuousPoles'

/** scale * prod numerator / prod (s - pole)^multiplicity, poles with conjugates understood; strictly proper. */
export interface PoleForm {
  scale: Rational
  numerator: FactorMap
  poles: ContinuousPole[]
}

/** A pole p and the coefficients of 1/(s - p), 1/(s - p)^2, ...; one with im > 0 stands for its conjugate too. */
export interface PartialFraction {
  pole: ComplexFloat
  coefficients: ComplexFloat[]
}

/** The numerator's factors with their coefficients rounded once, for repeated evaluation. */
interface RoundedFactor {
  coefficients: ComplexFloat[]
  power: number
}

/** Partial fractions by the Taylor series of what is left at each pole when that pole is taken out. */
export function partialFractions(form: PoleForm, arithmetic: ComplexArithmetic): PartialFraction[] {
  const factors = roundFactors(form.numerator, arithmetic)
  const scale = arithmetic.fromRational(form.scale)
  return form.poles.map(({ value: pole, multiplicity: m }) => {
    let top: ComplexFloat[] = [scale, ...new Array<ComplexFloat>(m - 1).fill(ComplexArithmetic.zero)]
    for (const { coefficients, power } of factors) {
      const series = taylor(coefficients, pole, m, arithmetic)
      for (let repeat = 0; repeat < power; repeat++) top = productOf(top, series, arithmetic)
    }
    let bottom: ComplexFloat[] = [ComplexArithmetic.one, ...new Array<ComplexFloat>(m - 1).fill(ComplexArithmetic.zero)]
    const takeIn = (other: ComplexFloat, power: number) => {
      const gap = arithmetic.subtract(pole, other)
      for (let repeat = 0; repeat < power; repeat++) {
        bottom = bottom.map((value, k) => {
          const product = arithmetic.multiply(value, gap)
          return k === 0 ? product : arithmetic.add(product, bottom[k - 1] as ComplexFloat)
        })
      }
    }
    for (const { value, multiplicity } of form.poles) {
      if (value !== pole) takeIn(value, multiplicity)
      if (value.im !== 0n) takeIn({ ...value, im: -value.im }, multiplicity)
    }
    return { pole, coefficients: quotientOf(top, bottom, arithmetic).reverse() }
  })
}

/** The same function from its factors, at one point. */
export function evaluatePoleForm(form: PoleForm, s: ComplexFloat, arithmetic: ComplexArithmetic): ComplexFloat {
  let value = arithmetic.fromRational(form.scale)
  for (const { coefficients, power } of roundFactors(form.numerator, arithmetic)) {
    const factor = taylor(coefficients, s, 1, arithmetic)[0] as ComplexFloat
    for (let repeat = 0; repeat < power; repeat++) value = arithmetic.multiply(value, factor)
  }
  let bottom = ComplexArithmetic.one
  for (const { value: pole, multiplicity } of form.poles) {
    let gap = arithmetic.subtract(s, pole)
    if (pole.im !== 0n) gap = arithmetic.multiply(gap, arithmetic.subtract(s, { ...pole, im: -pole.im }))
    for (let repeat = 0; repeat < multiplicity; repeat++) bottom = arithmetic.multiply(bottom, gap)
  }
  return arithmetic.divide(value, bottom)
}

/** The sum of partial fractions at one point. */
export function evaluateFractions(fractions: PartialFraction[], s: ComplexFloat, arithmetic: ComplexArithmetic): ComplexFloat {
  let sum = ComplexArithmetic.zero
  const addAt = (pole: ComplexFloat, coefficients: ComplexFloat[]) => {
    const step = arithmetic.divide(ComplexArithmetic.one, arithmetic.subtract(s, pole))
    let value = ComplexArithmetic.zero
    for (let k = coefficients.length - 1; k >= 0; k--) value = arithmetic.multiply(arithmetic.add(value, coefficients[k] as ComplexFloat), step)
    sum = arithmetic.add(sum, value)
  }
  for (const { pole, coefficients } of fractions) {
    addAt(pole, coefficients)
    if (pole.im !== 0n) addAt({ ...pole, im: -pole.im }, coefficients.map(value => ({ ...value, im: -value.im })))
  }
  return sum
}

function roundFactors(factors: FactorMap, arithmetic: ComplexArithmetic): RoundedFactor[] {
  return Array.from(factors.values(), ({ coefficients, power }) => ({
    coefficients: coefficients.map(coefficient => arithmetic.round(coefficient, 0n, 0)), power,
  }))
}

/** The first m Taylor coefficients of a polynomial at x, by repeated synthetic division. */
function taylor(coefficients: ComplexFloat[], x: ComplexFloat, m: number, arithmetic: ComplexArithmetic): ComplexFloat[] {
  let rest = coefficients
  const series: ComplexFloat[] = []
  for (let k = 0; k < m; k++) {
    if (rest.length === 0) {
      series.push(ComplexArithmetic.zero)
      continue
    }
    const quotient = new Array<ComplexFloat>(rest.length - 1)
    let value = rest[rest.length - 1] as ComplexFloat
    for (let j = rest.length - 2; j >= 0; j--) {
      quotient[j] = value
      value = arithmetic.add(arithmetic.multiply(value, x), rest[j] as ComplexFloat)
    }
    series.push(value)
    rest = quotient
  }
  return series
}

function productOf(a: ComplexFloat[], b: ComplexFloat[], arithmetic: ComplexArithmetic): ComplexFloat[] {
  return a.map((_, k) => {
    let sum = ComplexArithmetic.zero
    for (let j = 0; j <= k; j++) sum = arithmetic.add(sum, arithmetic.multiply(a[j] as ComplexFloat, b[k - j] as ComplexFloat))
    return sum
  })
}

function quotientOf(a: ComplexFloat[], b: ComplexFloat[], arithmetic: ComplexArithmetic): ComplexFloat[] {
  const quotient: ComplexFloat[] = []
  for (let k = 0; k < a.length; k++) {
    let rest = a[k] as ComplexFloat
    for (let j = 0; j < k; j++) rest = arithmetic.subtract(rest, arithmetic.multiply(quotient[j] as ComplexFloat, b[k - j] as ComplexFloat))
    quotient.push(arithmetic.divide(rest, b[0] as ComplexFloat))
  }
  return quotient
}
