import { ComplexArithmetic, logSize } from '../../numeric/extended/ComplexArithmetic'
import type { ComplexFloat } from '../../numeric/extended/ComplexFloat'
import { evaluateFractions, evaluatePoleForm, type PartialFraction, type PoleForm } from './partialFractions'
import type { SampledFraction, SampledSum } from './sampledFractions'

export interface EquivalentToCheck {
  form: PoleForm
  fractions: PartialFraction[]
  sampled: SampledFraction[]
  shifts: number[]
  sum: SampledSum
  bits: number
  /** rad/s */
  frequencies: number[]
  /** s */
  sampleTime: number
}

/** Parts of the response this far (bits) below its largest are not asked to be right to their own size. */
const RANGE_BITS = 200

/**
 * To how many bits two equalities hold at the frequencies: the partial fractions against the factors they came from (in s), of the size of either or of what is sampled of it;
 * the quotient of polynomials in z against the sum of its modes.
 */
export function checkEquivalent({ form, fractions, sampled, shifts, sum, bits, frequencies, sampleTime }: EquivalentToCheck): { worstBits: number } {
  const arithmetic = new ComplexArithmetic(bits + 64)
  const time = arithmetic.fromDoubles(sampleTime, 0)
  const places = frequencies.map((w) => {
    const s = arithmetic.fromDoubles(0, w)
    const z = arithmetic.exponential(arithmetic.multiply(s, time))
    return { s, z, modes: sumOfModes(sampled, shifts, z, arithmetic) }
  })
  const largest = Math.max(...places.map(({ modes }) => logSize(modes)))
  let worst = Infinity
  for (const { s, z, modes } of places) {
    const floor = largest - RANGE_BITS
    const size = Math.max(logSize(modes), floor)
    const quotient = arithmetic.divide(valueAt(sum.numerator, z, bits, arithmetic), valueAt(sum.denominator, z, bits, arithmetic))
    const difference = arithmetic.subtract({ ...quotient, exponent: quotient.exponent + sum.exponent }, modes)
    worst = Math.min(worst, size - logSize(difference))
    const factored = evaluatePoleForm(form, s, arithmetic)
    const ownSize = Math.max(logSize(factored), size + Math.log2(sampleTime))
    worst = Math.min(worst, ownSize - logSize(arithmetic.subtract(evaluateFractions(fractions, s, arithmetic), factored)))
  }
  return { worstBits: Math.min(worst, bits) }
}

function sumOfModes(sampled: SampledFraction[], shifts: number[], z: ComplexFloat, arithmetic: ComplexArithmetic): ComplexFloat {
  let sum = ComplexArithmetic.zero
  shifts.forEach((shift, edge) => {
    const fractions = sampled.map(({ pole, pair, coefficients }) => ({ pole: pair || pole.im === 0n ? pole : { ...pole, im: 0n }, coefficients: coefficients[edge] as ComplexFloat[] }))
    let value = evaluateFractions(fractions, z, arithmetic)
    for (let k = 0; k < shift; k++) value = arithmetic.multiply(value, z)
    sum = arithmetic.add(sum, value)
  })
  return sum
}

function valueAt(coefficients: bigint[], z: ComplexFloat, bits: number, arithmetic: ComplexArithmetic): ComplexFloat {
  let value = ComplexArithmetic.zero
  for (let k = coefficients.length - 1; k >= 0; k--) {
    value = arithmetic.add(arithmetic.multiply(value, z), { re: coefficients[k] as bigint, im: 0n, exponent: -bits })
  }
  return value
}
