import { Rational } from '../../numeric/extended/Rational'
import { AnalysisInputError } from '../AnalysisInputError'
import type { FactoredLoop } from '../FactoredLoop'
import { factorsFromPolynomials } from '../factors/factorsFromPolynomials'
import type { ExactLoop, FactorMap } from './ExactLoop'
import { FactorProduct } from './FactorProduct'

/**
 * An exact loop gain without its sums of different dead times, as factors; its gain times `extraGain`.
 *
 * @throws AnalysisInputError where its gain leaves the range of doubles
 */
export function rationalPart(exact: ExactLoop, sampleTime: number | undefined, extraGain = Rational.one): FactoredLoop {
  const sampled = sampleTime !== undefined
  const numerator = FactorProduct.times(exact.numerator, exact.inverted)
  const gain = exact.scale.times(extraGain).times(leadOf(numerator)).over(leadOf(exact.denominator)).toNumber()
  if (gain === 0 || !Number.isFinite(gain)) {
    throw new AnalysisInputError('The gain of the expression is beyond what doubles can hold.', 'expression', 0)
  }
  const roots = (factors: FactorMap) => factorsFromPolynomials(
    Array.from(factors.values(), ({ coefficients, power, roots: given, precise }) => ({ polynomial: { coefficients, exponent: 0 }, power, given, precise })), sampled, 'expression')
  return {
    gain,
    zeros: roots(numerator),
    poles: roots(exact.denominator),
    deadTime: exact.delay.toNumber(),
    ...(sampled ? { sampleTime } : {}),
  }
}

function leadOf(factors: FactorMap): Rational {
  let lead = 1n
  for (const { coefficients, power } of factors.values()) lead *= (coefficients[coefficients.length - 1] as bigint) ** BigInt(power)
  return Rational.of(lead, 1n)
}
