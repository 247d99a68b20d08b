import { bitLength } from '../../numeric/extended/bitLength'
import type { Rational } from '../../numeric/extended/Rational'
import type { DelayedPolynomial, DelayedSum } from './ExactLoop'
import { FactorProduct } from './FactorProduct'
import { leadOfTerm } from './leadOfTerm'

/**
 * A sum of different dead times near s = 0: Q(s) = s^order exp(logScale) sum_k coefficients[k] (s/unit)^k for |s| <= reach, but for an
 * error of at most `left` (in units of exp(logScale)).
 */
export interface OriginSeries {
  order: number
  coefficients: Float64Array
  unit: number
  reach: number
  logScale: number
  left: number
}

const BITS = 512
/** Terms of the exponential; with |s| T <= 1/2 what is left out is below 2^-25/25! of each term. */
const EXPONENTIAL_TERMS = 25
/** Q(0) counts as 0 when it is below this many units of 2^-53 of its terms: rounding of the numbers it was typed with. */
const ZERO_UNITS = 8
/** Below this part of its terms Q(0) suffers from cancellation, and the series is worth its cost. */
const CANCELLING = 0.05

/**
 * The Taylor series of a sum about s = 0 in 512-bit fixed point, where its terms cancel there as in 1 - exp(-sT); null where they do not.
 * It is in the units of `GeneralSum`, the first term's polynomial monic. Leading coefficients that are zero to within rounding of the given numbers are taken as zeros of Q at s = 0.
 */
export function originSeries(exact: DelayedSum): OriginSeries | null {
  const reference = leadOfTerm(exact.terms[0]!)
  const sum = { terms: exact.terms.map(term => ({ ...term, scale: term.scale.over(reference) })) }
  if (!cancelsAtOrigin(sum)) return null
  const longest = Math.max(...sum.terms.map(term => term.delay.toNumber()))
  const exponent = -Math.ceil(Math.log2(longest))
  const degree = Math.max(...sum.terms.map(term => FactorProduct.degree(term.factors)))
  const count = degree + EXPONENTIAL_TERMS
  const polynomials = sum.terms.map(term => FactorProduct.expanded(term.factors))
  let top = -Infinity
  sum.terms.forEach((term, t) => polynomials[t]!.forEach((coefficient, k) => {
    if (coefficient !== 0n) top = Math.max(top, sizeOf(term.scale) + bitLength(coefficient) + exponent * k)
  }))
  const total = new Array<bigint>(count).fill(0n)
  const absolute = new Array<bigint>(count).fill(0n)
  sum.terms.forEach((term, t) => addTerm(term, polynomials[t]!, exponent, BITS - top, total, absolute))
  let order = 0
  while (order < count - 1 && isZero(total[order]!, absolute[order]!)) order++
  const unit = 2 ** exponent
  const coefficients = Float64Array.from(total.slice(order), value => toNumber(value, BITS))
  const majorant = absolute.reduce((sumSoFar, value, k) => sumSoFar + toNumber(value, BITS) * 2 ** -k, 0)
  return {
    order, coefficients, unit,
    reach: unit / 2,
    logScale: top * Math.LN2 - order * Math.log(unit),
    // 0.5^25/25! < 1e-32, divided by (1/2)^order where the zero is taken out
    left: majorant * 2 ** order * 1e-31,
  }
}

function cancelsAtOrigin(sum: Pick<DelayedSum, 'terms'>): boolean {
  let value = 0
  let size = 0
  for (const term of sum.terms) {
    let at = term.scale.toNumber()
    for (const { coefficients, power } of term.factors.values()) at *= Number(coefficients[0]!) ** power
    if (!Number.isFinite(at)) return true
    value += at
    size += Math.abs(at)
  }
  return Math.abs(value) <= CANCELLING * size
}

/** log2 of a fraction, to within one. */
function sizeOf(value: Rational): number {
  return bitLength(value.numerator) - bitLength(value.denominator)
}

/** Adds scale * polynomial(2^exponent x) * exp(-T 2^exponent x), times 2^shift, by powers of x. */
function addTerm(term: DelayedPolynomial, polynomial: bigint[], exponent: number, shift: number, total: bigint[], absolute: bigint[]): void {
  const { numerator, denominator } = term.scale
  const exponential: bigint[] = [1n << BigInt(BITS)]
  for (let n = 1; n < total.length; n++) {
    const next = place(-(exponential[n - 1]!) * term.delay.numerator, exponent) / (term.delay.denominator * BigInt(n))
    exponential.push(next)
  }
  polynomial.forEach((coefficient, k) => {
    if (coefficient === 0n) return
    const scaled = place(coefficient * numerator, shift + exponent * k) / denominator
    for (let n = 0; k + n < total.length; n++) {
      const product = (scaled * exponential[n]!) >> BigInt(BITS)
      total[k + n] = total[k + n]! + product
      absolute[k + n] = absolute[k + n]! + (product < 0n ? -product : product)
    }
  })
}

function place(value: bigint, power: number): bigint {
  return power >= 0 ? value << BigInt(power) : value >> BigInt(-power)
}

function isZero(value: bigint, absolute: bigint): boolean {
  const size = value < 0n ? -value : value
  // a few units of the fixed point are its own rounding
  return (size << 53n) <= BigInt(ZERO_UNITS) * absolute + (1n << 60n)
}

function toNumber(value: bigint, bits: number): number {
  const excess = bitLength(value) - 64
  return excess > 0 ? Number(value >> BigInt(excess)) * 2 ** (excess - bits) : Number(value) * 2 ** -bits
}
