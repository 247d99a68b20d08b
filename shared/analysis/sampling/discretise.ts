import { ComplexArithmetic, isZero, place } from '../../numeric/extended/ComplexArithmetic'
import type { ComplexFloat } from '../../numeric/extended/ComplexFloat'
import { Rational } from '../../numeric/extended/Rational'
import type { HoldGain } from '../../types/block'
import { AnalysisInputError } from '../AnalysisInputError'
import type { ExactLoop, FactorMap } from '../expressions/ExactLoop'
import { FactorProduct } from '../expressions/FactorProduct'
import { checkEquivalent } from './checkEquivalent'
import { checkFrequencies, lowestBits } from './checkFrequencies'
import { ContinuousPoles } from './continuousPoles'
import { holdEdges } from './holdEdges'
import { holdWords } from './holdWords'
import { partialFractions, type PoleForm } from './partialFractions'
import { addSampledFractions, sampledFractions } from './sampledFractions'

/** The exact discrete equivalent of a hold and everything continuous behind it. */
export interface DiscreteEquivalent {
  /** in z, without dead time and sums */
  loop: ExactLoop
  /** relative size by which it may differ on the unit circle from what was given */
  accuracy: { relative: number, basis: string }
  /** words for the note where the hold is an average of two that alternate; null where it is exact */
  averaged: string | null
}

/** Relative difference that two ways of evaluating the equivalent may have. */
const TARGET_BITS = 80
const MOST_BITS = 16_384
/** Bits of a pole's factor beyond those of its distance from the unit circle. */
const POLE_BITS = 128
/** Units of the fixed point that may be rounding. */
const ROUNDED = 1n << 20n
const S_KEY = '0,1'
const Z_MINUS_ONE = FactorProduct.of([-1n, 1n]).factors

/**
 * The discrete equivalent of a continuous loop gain behind a hold: what the controller sees of it at its sampling instants,
 * H(z) = sum over the samples k of f(kT) z^-k, where f is the response to one sample as the hold puts it out.
 *
 * - zeroOrder: H = (1 - 1/z) Z{step response of G, tau late}; a direct feedthrough is seen at once. Any dead time tau, fractions of T included
 *   (K. J. Astrom, B. Wittenmark, 'Computer-Controlled Systems', 1997, section 3.2; E. I. Jury, 'Theory and Application of the z-Transform Method', 1964).
 * - pwm: a small change of the sample moves both edges of the pulse, an impulse of half its area at each: H = T Z{(g(t - t1) + g(t - t2))/2}, which is G at low frequency
 *   (D. M. Van de Sype et al., 'Small-signal Laplace-domain analysis of uniformly-sampled pulse-width modulators', 2004). An edge at a sampling instant comes just after it.
 *
 * The partial fractions of G are worked out with as many bits as it takes until the quotient of polynomials and the sum it came from agree
 * to 2^-80 on the unit circle, and the fractions with the factors of G beside it. Poles go to exp(pT) each as its own factor, a multiple one as a power; those at s = 0 go exactly to z = 1.
 *
 * @param continuous all that is continuous behind the hold, its dead time in `delay` (s), without sums of different dead times
 * @throws AnalysisInputError with path 'expression' and no position: improper, an impulse on a direct feedthrough, modes that cannot be held
 */
export function discretise(continuous: ExactLoop, hold: HoldGain): DiscreteEquivalent {
  refuseWhatHasNone(continuous, hold)
  try {
    return equivalentOf(continuous, hold)
  }
  catch (error) {
    if (!(error instanceof RangeError)) throw error
    throw new AnalysisInputError(`The discrete equivalent of ${holdWords(hold)} and what is behind it cannot be worked out: ${error.message}.`, 'expression')
  }
}

function refuseWhatHasNone(continuous: ExactLoop, hold: HoldGain): void {
  if (continuous.sums.size > 0) {
    throw new AnalysisInputError(`A dead time inside a sum or a feedback behind ${holdWords(hold)} has no finite discrete equivalent: give each dead time as a factor of the product.`, 'expression')
  }
  if (continuous.delay.sign < 0) throw new AnalysisInputError(`Dead time below zero behind ${holdWords(hold)}: the loop gain would look into the future.`, 'expression')
  const excess = FactorProduct.degree(continuous.numerator) + FactorProduct.degree(continuous.inverted) - FactorProduct.degree(continuous.denominator)
  if (excess > 0) throw new AnalysisInputError(`Improper: what is behind ${holdWords(hold)} has more zeros than poles. Add the poles that limit it.`, 'expression')
  if (excess === 0 && hold.hold !== 'zeroOrder') {
    throw new AnalysisInputError(`${holdWords(hold, true)} moves edges of pulses, which a plant with direct feedthrough (as many zeros as poles) passes on as impulses, so its samples have no value. Add the pole that limits it, the anti-alias filter say.`, 'expression')
  }
}

function equivalentOf(continuous: ExactLoop, hold: HoldGain): DiscreteEquivalent {
  const sampleTime = Rational.fromDouble(hold.sampleTime)
  const zeroOrder = hold.hold === 'zeroOrder'
  const all = FactorProduct.times(continuous.numerator, continuous.inverted)
  const hidden = FactorProduct.common(all, continuous.denominator)
  let numerator = FactorProduct.without(all, hidden)
  let denominator = FactorProduct.without(continuous.denominator, hidden)
  // The step behind a zero-order hold is 1/s, the hold's end the zero at z = 1: where G has a zero at 0 that takes the 1/s, elsewhere the image of the 1/s takes the zero.
  const s = new Map([[S_KEY, { coefficients: [0n, 1n], power: 1 }]])
  const blocksConstant = zeroOrder && numerator.has(S_KEY)
  if (blocksConstant) numerator = FactorProduct.without(numerator, s)
  else if (zeroOrder) denominator = FactorProduct.times(denominator, s)
  const edges = holdEdges(hold, continuous.delay)
  const whole = Math.max(...edges.map(edge => edge.whole))
  const shifts = edges.map(edge => whole - edge.whole)
  const poles = new ContinuousPoles(denominator)
  const frequencies = checkFrequencies(poles.approximate, hold.sampleTime)
  const scale = continuous.scale.over(leadOf(denominator))
  // A strictly proper plant has not answered at the instant its step arrives.
  const silentAtFirst = zeroOrder && edges.every(edge => edge.fraction.sign === 0) && FactorProduct.degree(all) < FactorProduct.degree(continuous.denominator)
  const hiddenPoles = new ContinuousPoles(hidden)

  for (let bits = lowestBits(poles.approximate, frequencies, hold.sampleTime, TARGET_BITS); ;) {
    const arithmetic = new ComplexArithmetic(bits + 64)
    const form: PoleForm = { scale, numerator, poles: poles.refine(bits + 64) }
    const fractions = partialFractions(form, arithmetic)
    const sampled = sampledFractions(fractions, edges, sampleTime, arithmetic)
    const sum = addSampledFractions(sampled, shifts, bits)
    if (silentAtFirst) sum.numerator[sum.numerator.length - 1] = 0n
    dropRounding(sum.numerator, sampled.length)
    const found = sum.numerator.length === 0
      ? { worstBits: 0 }
      : checkEquivalent({ form, fractions, sampled, shifts, sum, bits, frequencies, sampleTime: hold.sampleTime })
    if (found.worstBits >= TARGET_BITS) {
      const { scale: lead, factors } = FactorProduct.of(sum.numerator)
      const { factors: down, largestChange } = poleFactors(sampled, bits)
      const images = poleFactors(hiddenImages(hiddenPoles, sampleTime, arithmetic), bits).factors
      const loop: ExactLoop = {
        // the factors are whole numbers, the poles of the sum monic
        scale: lead.times(powerOfTwo(sum.exponent - bits)).times(leadOf(down)).times(zeroOrder ? Rational.one : sampleTime),
        delay: Rational.zero,
        numerator: FactorProduct.asPrecise(FactorProduct.times(blocksConstant ? FactorProduct.times(factors, Z_MINUS_ONE) : factors, images)),
        denominator: FactorProduct.asPrecise(FactorProduct.times(
          FactorProduct.times(zeroOrder && !blocksConstant ? FactorProduct.without(down, Z_MINUS_ONE) : down, images),
          powersOfZ(zeroOrder ? whole : whole - 1),
        )),
        inverted: FactorProduct.empty,
        common: new Set(),
        sums: new Map(),
      }
      const relative = 2 ** -found.worstBits + 2 * sampled.length * largestChange
      return {
        loop,
        accuracy: {
          relative,
          basis: `discrete equivalent behind ${holdWords(hold)} by partial fractions of ${bits} bits`,
        },
        averaged: averagedWords(hold),
      }
    }
    if (bits >= MOST_BITS) throw new RangeError('its poles lie too close together, or too close to z = 1, to be told apart')
    bits = Math.min(MOST_BITS, bits + 64 + Math.max(64, TARGET_BITS - found.worstBits))
  }
}

/** Coefficients at either end that are nothing but rounding, and roots beyond what doubles hold, which differ on the unit circle from 0 and infinity by less than 2^-900. */
function dropRounding(numerator: bigint[], terms: number): void {
  const noise = BigInt(64 * (terms + 1))
  const far = 1n << 900n
  const small = (value: bigint) => value <= noise && value >= -noise
  const size = (value: bigint) => value < 0n ? -value : value
  const at = (k: number) => numerator[k] as bigint
  while (numerator.length > 0 && (small(at(numerator.length - 1)) || (numerator.length > 1 && size(at(numerator.length - 1)) * far < size(at(numerator.length - 2))))) numerator.pop()
  for (let k = 0; k + 1 < numerator.length && (small(at(k)) || size(at(k)) * far < size(at(k + 1))); k++) numerator[k] = 0n
}

/** The factors z - q, or of a pair z^2 - 2 Re q z + |q|^2, to enough bits, and by how much their rounding may change one of them on the circle. */
function poleFactors(fractions: { pole: ComplexFloat, pair: boolean, multiplicity: number }[], bits: number): { factors: FactorMap, largestChange: number } {
  let factors: FactorMap = FactorProduct.empty
  let worst = 0
  for (const { pole, pair, multiplicity } of fractions) {
    const one = 1n << BigInt(bits)
    const re = place(pole.re, pole.exponent + bits)
    const im = place(pole.im, pole.exponent + bits)
    const square = place(re * re + im * im, -bits)
    // | |q|^2 - 1 |; an undamped pole has rounding there and nothing else
    const excess = square > one ? square - one : one - square
    const distance = excess < ROUNDED ? 0 : Rational.of(excess, one).toNumber()
    const kept = Math.min(bits, POLE_BITS + (distance > 0 ? Math.max(0, Math.ceil(-Math.log2(distance))) : 0))
    const cut = (value: bigint) => place(value, kept - bits)
    const coefficients = pair ? [cut(square), cut(-2n * re), 1n << BigInt(kept)] : [cut(-re), 1n << BigInt(kept)]
    if (distance > 0) worst = Math.max(worst, multiplicity * 2 ** -kept / distance)
    factors = FactorProduct.times(factors, FactorProduct.toPower(FactorProduct.of(coefficients).factors, multiplicity))
  }
  return { factors, largestChange: worst }
}

/** Images of poles that a zero of the plant hides: both go on into z. */
function hiddenImages(poles: ContinuousPoles, sampleTime: Rational, arithmetic: ComplexArithmetic): { pole: ComplexFloat, pair: boolean, multiplicity: number }[] {
  const time = arithmetic.fromRational(sampleTime)
  return poles.refine(arithmetic.bits)
    .map(({ value, multiplicity }) => ({ pole: arithmetic.exponential(arithmetic.multiply(value, time)), pair: value.im !== 0n, multiplicity }))
    .filter(({ pole }) => !isZero(pole))
}

function powersOfZ(power: number): FactorMap {
  return power === 0 ? FactorProduct.empty : new Map([[S_KEY, { coefficients: [0n, 1n], power }]])
}

function powerOfTwo(exponent: number): Rational {
  return exponent >= 0 ? Rational.of(1n << BigInt(exponent), 1n) : Rational.of(1n, 1n << BigInt(-exponent))
}

function leadOf(factors: FactorMap): Rational {
  let lead = 1n
  for (const { coefficients, power } of factors.values()) lead *= (coefficients[coefficients.length - 1] as bigint) ** BigInt(power)
  return Rational.of(lead, 1n)
}

function averagedWords(hold: HoldGain): string | null {
  if (hold.hold !== 'pwmDoubleUpdate' || (hold.duty ?? 0.5) === 0.5) return null
  return `At a duty ratio of ${hold.duty} the delay from an update to its edge alternates between ${hold.duty} and ${1 - (hold.duty as number)} of a sample, so the loop repeats every two samples; the mean of both is analysed.`
}
