import { Rational } from '../../../numeric/extended/Rational'
import type { ModalGain } from '../../../types/block'
import type { ExactLoop, PolynomialFactor } from '../../expressions/ExactLoop'
import { FactorProduct } from '../../expressions/FactorProduct'
import { scaledPolynomial } from './scaledPolynomial'

/** Numerator and denominator, lowest power first. */
interface Fraction {
  numerator: bigint[]
  denominator: bigint[]
}

/**
 * One channel of a modal table (numbers from 0): sum of gainOut gainIn s^derivative/(s^2 + 2 damping w s + w^2) and of the rigid terms, exactly, over
 * their common denominator with each mode a factor of its own. w is the frequency in rad/s, from Hz rounded once. Modes and rigid terms without gain in the channel are no part
 * of it, but for modes without damping or with less: those stay as hidden ones. Null where nothing is left.
 */
export function modalLeaf({ frequencyUnit, derivative, modes, rigid }: ModalGain, output: number, input: number): ExactLoop | null {
  const terms = new Map<string, { factor: PolynomialFactor, gain: Rational }>()
  const gainOf = ({ gainIn, gainOut }: { gainIn: number[], gainOut: number[] }) => Rational.fromDouble(gainOut[output]!).times(Rational.fromDouble(gainIn[input]!))
  for (const mode of modes) {
    const w = Rational.fromDouble(frequencyUnit === 'Hz' ? 2 * Math.PI * mode.frequency : mode.frequency)
    const damped = Rational.fromDouble(mode.damping).times(w)
    const { scale, factors } = scaledPolynomial([w.times(w), damped.plus(damped), Rational.one])!
    const [key, factor] = [...factors][0]!
    const gain = gainOf(mode).over(scale).plus(terms.get(key)?.gain ?? Rational.zero)
    terms.set(key, { factor, gain })
  }
  const used = [...terms].filter(([, { gain }]) => gain.sign !== 0)
  // one that is not stable stays in the loop, seen or not: in numerator and denominator alike
  const hidden = new Map([...terms].filter(([, { gain, factor }]) => gain.sign === 0 && factor.coefficients[1]! <= 0n).map(([key, { factor }]) => [key, factor]))
  // rigid[k] s^-k
  const rigidGains = [0, -1, -2].map(power => rigid.filter(term => term.power === power).reduce((sum, term) => sum.plus(gainOf(term)), Rational.zero))
  const integrators = rigidGains[2]!.sign !== 0 ? 2 : rigidGains[1]!.sign !== 0 ? 1 : 0

  let common = 1n
  for (const { denominator } of [...used.map(([, { gain }]) => gain), ...rigidGains]) common *= Rational.of(denominator, common).numerator
  const whole = (gain: Rational) => gain.numerator * (common / gain.denominator)
  const fractions: Fraction[] = used.map(([, { factor, gain }]) => ({
    numerator: [...new Array<bigint>(derivative).fill(0n), whole(gain)], denominator: factor.coefficients,
  }))
  if (rigidGains.some(gain => gain.sign !== 0)) {
    fractions.push({ numerator: rigidGains.slice(0, integrators + 1).map(whole).reverse(), denominator: [...new Array<bigint>(integrators).fill(0n), 1n] })
  }
  if (fractions.length === 0) return null
  const { numerator } = sumOf(fractions)
  while (numerator.length > 0 && numerator[numerator.length - 1] === 0n) numerator.pop()
  if (numerator.length === 0) return null
  const { scale, factors } = FactorProduct.of(numerator)
  const denominator = new Map(used.map(([key, { factor }]) => [key, factor]))
  if (integrators > 0) for (const [key, factor] of FactorProduct.of([...new Array<bigint>(integrators).fill(0n), 1n]).factors) denominator.set(key, factor)
  return {
    scale: scale.over(Rational.of(common, 1n)),
    delay: Rational.zero,
    numerator: FactorProduct.times(factors, hidden),
    denominator: FactorProduct.times(denominator, hidden),
    inverted: FactorProduct.empty,
    // as in a sum typed out, see ExactLoop
    common: new Set(fractions.length > 1 ? denominator.keys() : []),
    sums: new Map(),
  }
}

/** Sum of fractions over the product of their denominators, by halves so that numbers grow late. */
function sumOf(fractions: Fraction[]): Fraction {
  if (fractions.length === 1) return fractions[0]!
  const middle = fractions.length >> 1
  const a = sumOf(fractions.slice(0, middle))
  const b = sumOf(fractions.slice(middle))
  const left = FactorProduct.multiplied(a.numerator, b.denominator)
  const right = FactorProduct.multiplied(b.numerator, a.denominator)
  const numerator = Array.from({ length: Math.max(left.length, right.length) }, (_, k) => (left[k] ?? 0n) + (right[k] ?? 0n))
  return { numerator, denominator: FactorProduct.multiplied(a.denominator, b.denominator) }
}
