import { ComplexArithmetic, isZero, logSize, place, toDoubles } from '../../numeric/extended/ComplexArithmetic'
import type { ComplexFloat } from '../../numeric/extended/ComplexFloat'
import type { Rational } from '../../numeric/extended/Rational'
import type { HoldEdge } from './holdEdges'
import type { PartialFraction } from './partialFractions'

/** A pole of the sampled plant and what each edge adds at it: coefficients[edge][k] of 1/(z - pole)^(k + 1). */
export interface SampledFraction {
  pole: ComplexFloat
  /** whether it stands for its conjugate too */
  pair: boolean
  multiplicity: number
  coefficients: ComplexFloat[][]
}

/** ln of the growth within one sample beyond which doubles hold nothing beside that mode. */
const MOST_GROWTH = 34.5

/**
 * The z-transform of samples f((j + fraction) T), j >= 0, of each edge, divided by z: with f = sum c_l t^l/l! e^(pt) it is the sum of the
 * residues of F(s) e^(s fraction T) / (z - e^(sT)) at the poles of F (E. I. Jury, 'Theory and Application of the z-Transform Method', 1964, the modified transform).
 * About a pole p with s = p + e the denominator is z - q - d(e), q = e^(pT), d = q (e^(eT) - 1), so that 1/(z - q - d) = sum d^k / (z - q)^(k + 1).
 *
 * A pole that dies away within a sample to less than the arithmetic tells from nothing has its image at 0, or none where no edge sees it.
 *
 * @throws RangeError where a mode grows beyond use within one sample
 */
export function sampledFractions(fractions: PartialFraction[], edges: HoldEdge[], sampleTime: Rational, arithmetic: ComplexArithmetic): SampledFraction[] {
  const time = arithmetic.fromRational(sampleTime)
  const shares = edges.map(({ fraction }) => arithmetic.multiply(arithmetic.fromRational(fraction), time))
  const weights = edges.map(({ weight }) => arithmetic.fromRational(weight))
  const result: SampledFraction[] = []
  for (const { pole, coefficients } of fractions) {
    const m = coefficients.length
    if (toDoubles(arithmetic.multiply(pole, time)).re > MOST_GROWTH) throw new RangeError('a mode grows more than 1e15-fold within one sample; sample faster')
    const image = arithmetic.exponential(arithmetic.multiply(pole, time))
    const vanishing = logSize(image) < -arithmetic.bits
    const growth = vanishing ? [] : exponentialSeries(time, m, arithmetic).map((term, k) => k === 0 ? ComplexArithmetic.zero : arithmetic.multiply(term, image))
    const byEdge = shares.map((share, edge) => {
      const start = arithmetic.multiply(weights[edge] as ComplexFloat, arithmetic.exponential(arithmetic.multiply(pole, share)))
      let series = exponentialSeries(share, m, arithmetic).map(term => arithmetic.multiply(term, start))
      const list: ComplexFloat[] = []
      for (let k = 0; k < (vanishing ? 1 : m); k++) {
        // sum over l of c_l times the coefficient of e^l
        let sum = ComplexArithmetic.zero
        for (let l = k; l < m; l++) sum = arithmetic.add(sum, arithmetic.multiply(coefficients[l] as ComplexFloat, series[l] as ComplexFloat))
        list.push(sum)
        if (!vanishing && k + 1 < m) series = productOf(series, growth, arithmetic)
      }
      return list
    })
    if (!vanishing) result.push({ pole: image, pair: pole.im !== 0n, multiplicity: m, coefficients: byEdge })
    else if (byEdge.some(list => !isZero(list[0] as ComplexFloat))) {
      // The pair of a complex pole falls together: its share is real.
      const own = pole.im === 0n ? byEdge : byEdge.map(list => list.map(value => ({ re: 2n * value.re, im: 0n, exponent: value.exponent })))
      result.push({ pole: ComplexArithmetic.zero, pair: false, multiplicity: 1, coefficients: own })
    }
  }
  return gatherAtZero(result, arithmetic)
}

/** What stands at 0 is one fraction. */
function gatherAtZero(fractions: SampledFraction[], arithmetic: ComplexArithmetic): SampledFraction[] {
  const atZero = fractions.filter(({ pole }) => isZero(pole))
  if (atZero.length < 2) return fractions
  const sums = (atZero[0] as SampledFraction).coefficients.map((_, edge) =>
    [atZero.reduce((sum, { coefficients }) => arithmetic.add(sum, coefficients[edge]?.[0] as ComplexFloat), ComplexArithmetic.zero)])
  return [...fractions.filter(({ pole }) => !isZero(pole)), { pole: ComplexArithmetic.zero, pair: false, multiplicity: 1, coefficients: sums }]
}

/** 1, x, x^2/2!, ... */
function exponentialSeries(x: ComplexFloat, terms: number, arithmetic: ComplexArithmetic): ComplexFloat[] {
  const series = [ComplexArithmetic.one]
  for (let k = 1; k < terms; k++) {
    const next = arithmetic.multiply(series[k - 1] as ComplexFloat, x)
    series.push(arithmetic.divide(next, { re: BigInt(k), im: 0n, exponent: 0 }))
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

/** sum_edge z^shifts[edge] sum of its fractions = 2^exponent numerator(z) / denominator(z), lowest power first, both in units of 2^-bits, the denominator monic. */
export interface SampledSum {
  numerator: bigint[]
  denominator: bigint[]
  exponent: number
}

/** Adds the fractions up over their common denominator in fixed point, pairwise, so that nothing is divided. */
export function addSampledFractions(fractions: SampledFraction[], shifts: number[], bits: number): SampledSum {
  let exponent = -Infinity
  for (const { coefficients } of fractions) for (const list of coefficients) for (const value of list) exponent = Math.max(exponent, logSize(value))
  if (exponent === -Infinity) exponent = 0
  const leaves = fractions.map((fraction) => {
    const { numerators, denominator } = leafOf(fraction, bits, exponent)
    let numerator: bigint[] = []
    numerators.forEach((list, edge) => {
      numerator = sumOf(numerator, [...new Array<bigint>(shifts[edge] as number).fill(0n), ...list])
    })
    return { numerator, denominator }
  })
  return { ...addPairwise(leaves, bits), exponent }
}

interface Quotient { numerator: bigint[], denominator: bigint[] }

function addPairwise(leaves: Quotient[], bits: number): Quotient {
  if (leaves.length === 1) return leaves[0] as Quotient
  const middle = leaves.length >> 1
  const a = addPairwise(leaves.slice(0, middle), bits)
  const b = addPairwise(leaves.slice(middle), bits)
  return {
    numerator: sumOf(fixedProduct(a.numerator, b.denominator, bits), fixedProduct(b.numerator, a.denominator, bits)),
    denominator: fixedProduct(a.denominator, b.denominator, bits),
  }
}

/** One pole, or one pair, as a real quotient for each edge. */
function leafOf({ pole, pair, multiplicity: m, coefficients }: SampledFraction, bits: number, exponent: number): { numerators: bigint[][], denominator: bigint[] } {
  const fixed = (value: ComplexFloat, power: number): FixedPair => ({ re: place(value.re, value.exponent + power), im: place(value.im, value.exponent + power) })
  const q = fixed(pole, bits)
  const one: FixedPair = { re: 1n << BigInt(bits), im: 0n }
  const own: FixedPair[] = [{ re: -q.re, im: -q.im }, one]
  const powers: FixedPair[][] = [[one]]
  for (let k = 1; k <= m; k++) powers.push(complexProduct(powers[k - 1] as FixedPair[], own, bits))
  const numerators = coefficients.map((list) => {
    let sum: FixedPair[] = []
    list.forEach((value, k) => {
      const term = complexProduct([fixed(value, bits - exponent)], powers[m - 1 - k] as FixedPair[], bits)
      sum = term.map((entry, j) => ({ re: entry.re + (sum[j]?.re ?? 0n), im: entry.im + (sum[j]?.im ?? 0n) })).concat(sum.slice(term.length))
    })
    if (!pair) return sum.map(({ re }) => re)
    const conjugate = (powers[m] as FixedPair[]).map(({ re, im }) => ({ re, im: -im }))
    return complexProduct(sum, conjugate, bits).map(({ re }) => 2n * re)
  })
  const denominator = powers[m] as FixedPair[]
  if (!pair) return { numerators, denominator: denominator.map(({ re }) => re) }
  return { numerators, denominator: complexProduct(denominator, denominator.map(({ re, im }) => ({ re, im: -im })), bits).map(({ re }) => re) }
}

interface FixedPair { re: bigint, im: bigint }

function complexProduct(a: FixedPair[], b: FixedPair[], bits: number): FixedPair[] {
  const product = Array.from({ length: a.length + b.length - 1 }, () => ({ re: 0n, im: 0n }))
  a.forEach((x, i) => b.forEach((y, j) => {
    const entry = product[i + j] as FixedPair
    entry.re += x.re * y.re - x.im * y.im
    entry.im += x.re * y.im + x.im * y.re
  }))
  return product.map(({ re, im }) => ({ re: place(re, -bits), im: place(im, -bits) }))
}

function fixedProduct(a: bigint[], b: bigint[], bits: number): bigint[] {
  const product = new Array<bigint>(a.length + b.length - 1).fill(0n)
  a.forEach((x, i) => {
    if (x === 0n) return
    b.forEach((y, j) => {
      product[i + j] = (product[i + j] as bigint) + x * y
    })
  })
  return product.map(value => place(value, -bits))
}

function sumOf(a: bigint[], b: bigint[]): bigint[] {
  const [long, short] = a.length >= b.length ? [a, b] : [b, a]
  return long.map((value, k) => value + (short[k] ?? 0n))
}
