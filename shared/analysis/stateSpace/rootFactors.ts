import { splitDouble } from '../../numeric/extended/splitDouble'
import type { FactorMap } from '../expressions/ExactLoop'
import { FactorProduct } from '../expressions/FactorProduct'
import type { PreciseRoot } from './rootList'

/** Bits kept below the size of a root: some more than a double-double has. */
const BITS = 112

/** The product of (s - root) over real roots and conjugate pairs as whole-number factors of first and second order, equal roots as powers. */
export function rootFactors(roots: readonly PreciseRoot[]): FactorMap {
  let product = FactorProduct.empty
  for (const { re, reLow, im, imLow } of roots) {
    if (im < 0) continue
    if (re === 0 && im === 0) {
      product = FactorProduct.times(product, FactorProduct.of([0n, 1n]).factors)
      continue
    }
    const exponent = Math.ceil(Math.log2(Math.max(Math.abs(re), Math.abs(im)))) - BITS
    const a = whole(re, exponent) + whole(reLow, exponent)
    const b = whole(im, exponent) + whole(imLow, exponent)
    // over 2^exponent: x - a, or x^2 - 2 a x + a^2 + b^2, with x = s / 2^exponent
    const coefficients = im === 0 ? [-a, 1n] : [a * a + b * b, -2n * a, 1n]
    product = FactorProduct.times(product, FactorProduct.of(scaled(coefficients, exponent)).factors)
  }
  return product
}

function whole(value: number, exponent: number): bigint {
  const { mantissa, exponent: own } = splitDouble(value)
  const power = own - exponent
  return power >= 0 ? BigInt(mantissa) << BigInt(power) : BigInt(mantissa) >> BigInt(-power)
}

/** Coefficients of x^k turned into those of s^k, times a power of two. */
function scaled(coefficients: bigint[], exponent: number): bigint[] {
  const top = coefficients.length - 1
  return coefficients.map((value, k) => value << BigInt(exponent >= 0 ? exponent * (top - k) : -exponent * k))
}
