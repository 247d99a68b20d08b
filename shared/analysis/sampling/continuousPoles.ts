import { ComplexArithmetic, isZero, logSize } from '../../numeric/extended/ComplexArithmetic'
import type { ComplexFloat } from '../../numeric/extended/ComplexFloat'
import { polynomialRoots } from '../../numeric/extended/polynomialRoots'
import { Rational } from '../../numeric/extended/Rational'
import { ScaledPolynomial } from '../../numeric/extended/ScaledPolynomial'
import { squareFreeFactors } from '../../numeric/extended/squareFreeFactors'
import type { FactorMap } from '../expressions/ExactLoop'
import { snapToBoundary } from '../factors/snapToBoundary'

/** A pole in rad/s with as many bits as its arithmetic has; one with im > 0 stands for its conjugate too. */
export interface ContinuousPole {
  value: ComplexFloat
  multiplicity: number
}

/** Where a pole starts from: the polynomial whose simple root it is, or none where the double is the pole itself. */
interface PoleStart {
  re: number
  im: number
  multiplicity: number
  polynomial: bigint[] | null
}

/** Bits of the first Newton steps from a double; each later one has twice as many. */
const FIRST_BITS = 128
const MOST_STEPS = 12

/**
 * The poles of an exact denominator (in s) with any number of bits. Those that count as on the stability boundary by the rule of the engine lie exactly
 * on it, as they do for a loop that is not sampled; the others are refined by Newton's method from the proven double roots.
 *
 * @throws RangeError when roots cannot be told apart or leave the range of doubles
 */
export class ContinuousPoles {
  private readonly starts: PoleStart[] = []

  constructor(denominator: FactorMap) {
    for (const { coefficients, power, precise = false, roots } of denominator.values()) {
      for (const factor of squareFreeFactors(coefficients)) this.addRoots(factor.coefficients, factor.multiplicity * power, precise || roots !== undefined)
    }
  }

  /** Doubles, upper half plane and real axis, with multiplicities: for estimates. */
  get approximate(): readonly { re: number, im: number, multiplicity: number }[] {
    return this.starts
  }

  private addRoots(coefficients: bigint[], multiplicity: number, precise: boolean): void {
    if (coefficients.length === 2) {
      const root = Rational.of(-(coefficients[0] as bigint), coefficients[1] as bigint).toNumber()
      this.starts.push({ re: root, im: 0, multiplicity, polynomial: coefficients })
      return
    }
    const exact = { coefficients, exponent: 0 }
    const list = snapToBoundary(polynomialRoots(exact), false, precise ? null : ScaledPolynomial.fromExact(exact))
    for (let k = 0; k < list.re.length; k++) {
      const re = list.re[k] as number
      const im = list.im[k] as number
      if (im < 0) continue
      const onBoundary = list.onBoundary[k] === 1
      const same = onBoundary ? this.starts.find(start => start.polynomial === null && start.re === re && start.im === im) : undefined
      if (same) same.multiplicity += multiplicity
      else this.starts.push({ re, im, multiplicity, polynomial: onBoundary ? null : coefficients })
    }
  }

  /** The poles to `bits` bits, distinct from each other. */
  refine(bits: number): ContinuousPole[] {
    const poles: ContinuousPole[] = []
    for (const start of this.starts) {
      const value = refineRoot(start, bits)
      // Roots that different factors share agree to all bits but the last few.
      const same = poles.find(pole => isSame(pole.value, value, bits))
      if (same) same.multiplicity += start.multiplicity
      else poles.push({ value, multiplicity: start.multiplicity })
    }
    return poles
  }
}

function isSame(a: ComplexFloat, b: ComplexFloat, bits: number): boolean {
  if (isZero(a) || isZero(b)) return isZero(a) && isZero(b)
  const difference = new ComplexArithmetic(bits + 64).subtract(a, b)
  return logSize(difference) < logSize(a) - bits + 24
}

function refineRoot({ re, im, polynomial }: PoleStart, bits: number): ComplexFloat {
  const doubles = new ComplexArithmetic(bits).fromDoubles(re, im)
  if (polynomial === null) return doubles
  if (polynomial.length === 2) return new ComplexArithmetic(bits).fromRational(Rational.of(-(polynomial[0] as bigint), polynomial[1] as bigint))
  // Bits that Horner's rule may lose to cancellation.
  const spare = 48 + 2 * polynomial.length
  let value = doubles
  for (let target = Math.min(FIRST_BITS, bits); ; target = Math.min(2 * target, bits)) {
    const arithmetic = new ComplexArithmetic(target + spare)
    const rounded = polynomial.map(coefficient => arithmetic.round(coefficient, 0n, 0))
    let gained = 0
    for (let step = 0; gained < target / 2; step++) {
      if (step === MOST_STEPS) throw new RangeError('a pole cannot be told from the one beside it')
      const change = newtonStep(rounded, value, arithmetic)
      value = arithmetic.subtract(value, change)
      gained = logSize(value) - logSize(change) - 2
    }
    if (target === bits) return value
  }
}

function newtonStep(coefficients: ComplexFloat[], x: ComplexFloat, arithmetic: ComplexArithmetic): ComplexFloat {
  const n = coefficients.length - 1
  let value = coefficients[n] as ComplexFloat
  let slope = ComplexArithmetic.zero
  for (let k = n - 1; k >= 0; k--) {
    slope = arithmetic.add(arithmetic.multiply(slope, x), value)
    value = arithmetic.add(arithmetic.multiply(value, x), coefficients[k] as ComplexFloat)
  }
  return arithmetic.divide(value, slope)
}
