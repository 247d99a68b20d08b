import { bitLength } from '../../numeric/extended/bitLength'
import { ComplexArithmetic, isZero, logSize } from '../../numeric/extended/ComplexArithmetic'
import type { ComplexFloat } from '../../numeric/extended/ComplexFloat'
import type { FactoredLoop, FactorList } from '../FactoredLoop'
import type { ExactLoop, PolynomialFactor } from './ExactLoop'

const GRID = 7
const MOST_ROOTS = 9
const SHORT = 128
const short = new ComplexArithmetic(SHORT)
/** Bits a factor is evaluated with at first, what of them must be left after cancellation, and at most. */
const FIRST_BITS = 256
const MEANT_BITS = 80
const MOST_BITS = 16_384
/** Lowest frequency looked at, of half the sampling frequency. */
const LOWEST = 1e-6

/**
 * The largest relative difference found between an exact loop gain (without sums of dead times) and its factors in doubles, boundary rule and all: both
 * worked out with many bits on a grid of the axis and at the frequencies of the lightest zeros and poles, where rounding of a root shows most. Roots put on the stability boundary are looked at from beside. Rounded up to a power of two.
 */
export function differenceOfFactors(exact: ExactLoop, loop: FactoredLoop): { largest: number, frequencies: number } {
  const time = loop.sampleTime
  const top = [...exact.numerator.values(), ...exact.inverted.values()].map(prepare)
  const bottom = Array.from(exact.denominator.values(), prepare)
  const scale = short.fromRational(exact.scale)
  let largest = 0
  const frequencies = frequenciesOf(loop)
  for (const w of frequencies) {
    const at = (bits: number) => {
      const arithmetic = new ComplexArithmetic(bits)
      const s = arithmetic.fromDoubles(0, w)
      return time === undefined ? s : arithmetic.exponential(arithmetic.multiply(s, arithmetic.fromDoubles(time, 0)))
    }
    const logModulus = time === undefined ? Math.log2(w) : 0
    const whole = short.multiply(scale, short.divide(productOf(top, at, logModulus), productOf(bottom, at, logModulus)))
    if (isZero(whole)) continue
    const difference = short.subtract(valueOfFactors(loop, at(SHORT)), whole)
    largest = Math.max(largest, 2 ** (logSize(difference) - logSize(whole) + 1))
  }
  return { largest, frequencies: frequencies.length }
}

function frequenciesOf({ zeros, poles, sampleTime }: FactoredLoop): number[] {
  const roots = [...rootsOf(zeros, sampleTime), ...rootsOf(poles, sampleTime)]
  const sizes = roots.map(({ frequency }) => frequency).filter(w => w > 0 && Number.isFinite(w))
  const end = sampleTime === undefined ? 3 * Math.max(1e-300, ...sizes) : Math.PI / sampleTime * (1 - 2 ** -12)
  const start = Math.min(0.3 * end, Math.max(sampleTime === undefined ? 0 : LOWEST * end, 0.3 * Math.min(end, ...sizes)))
  const grid = Array.from({ length: GRID }, (_, k) => start * (end / start) ** (k / (GRID - 1)))
  const light = roots.filter(({ frequency, damping }) => damping < 0.1 && frequency > 0 && frequency < end)
    .sort((a, b) => a.damping - b.damping)
    .slice(0, MOST_ROOTS)
    .map(({ frequency, onBoundary }) => onBoundary ? frequency * (1 + 2 ** -7) : frequency)
  return [...grid, ...light.filter(w => w < end)]
}

/** Frequency on the axis (rad/s) and damping of each root of the upper half plane. */
function rootsOf({ re, im, onBoundary }: FactorList, sampleTime: number | undefined): { frequency: number, damping: number, onBoundary: boolean }[] {
  return Array.from(re, (x, k) => ({ x, y: im[k] as number, onBoundary: onBoundary[k] === 1 }))
    .filter(({ y }) => y >= 0)
    .map(({ x, y, onBoundary }) => {
      if (sampleTime === undefined) return { frequency: y > 0 ? y : Math.abs(x), damping: y > 0 ? Math.abs(x) / Math.hypot(x, y) : 1, onBoundary }
      const [rate, turn] = [Math.log(Math.hypot(x, y)), Math.atan2(y, x)]
      return { frequency: (y > 0 ? turn : Math.abs(rate)) / sampleTime, damping: y > 0 ? Math.abs(rate) / Math.hypot(rate, turn) : 1, onBoundary }
    })
}

interface PreparedFactor {
  coefficients: bigint[]
  lengths: number[]
  power: number
}

function prepare({ coefficients, power }: PolynomialFactor): PreparedFactor {
  return { coefficients, lengths: coefficients.map(bitLength), power }
}

/** The product at a point, each factor with as many bits as cancellation in it asks for; `at` gives the point with any number of bits. */
function productOf(factors: PreparedFactor[], at: (bits: number) => ComplexFloat, logModulus: number): ComplexFloat {
  let product = ComplexArithmetic.one
  for (const { coefficients, lengths, power } of factors) {
    const size = Math.max(...lengths.map((length, k) => length > 0 ? length + k * logModulus : -Infinity)) + Math.log2(coefficients.length)
    let value = ComplexArithmetic.zero
    for (let bits = FIRST_BITS; ;) {
      value = hornerAt(coefficients, at(bits), new ComplexArithmetic(bits))
      const lost = size - logSize(value)
      if (bits - lost >= MEANT_BITS || bits >= MOST_BITS) break
      bits = Math.min(MOST_BITS, lost === Infinity ? 2 * bits : Math.ceil(lost) + 2 * MEANT_BITS)
    }
    for (let repeat = 0; repeat < power; repeat++) product = short.multiply(product, value)
  }
  return product
}

function hornerAt(coefficients: bigint[], at: ComplexFloat, arithmetic: ComplexArithmetic): ComplexFloat {
  let value = ComplexArithmetic.zero
  for (let k = coefficients.length - 1; k >= 0; k--) value = arithmetic.add(arithmetic.multiply(value, at), arithmetic.round(coefficients[k] as bigint, 0n, 0))
  return value
}

function valueOfFactors({ gain, zeros, poles }: FactoredLoop, at: ComplexFloat): ComplexFloat {
  const product = ({ re, im }: FactorList) => {
    let value = ComplexArithmetic.one
    for (let k = 0; k < re.length; k++) value = short.multiply(value, short.subtract(at, short.fromDoubles(re[k] as number, im[k] as number)))
    return value
  }
  return short.multiply(short.fromDoubles(gain, 0), short.divide(product(zeros), product(poles)))
}
