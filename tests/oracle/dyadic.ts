/** An exact dyadic rational: `mantissa * 2^exponent`. Every finite double is one. */
export interface Dyadic {
  mantissa: bigint
  exponent: number
}

const view = new DataView(new ArrayBuffer(8))

/** The exact value of a finite double. @throws RangeError for NaN and infinities */
export function dyadicOf(value: number): Dyadic {
  if (!Number.isFinite(value)) throw new RangeError(`no exact value: ${value}`)
  view.setFloat64(0, value)
  const bits = view.getBigUint64(0)
  const fraction = bits & 0xFFFFFFFFFFFFFn
  const biased = Number((bits >> 52n) & 0x7FFn)
  const magnitude = biased === 0 ? fraction : fraction | 0x10000000000000n
  let exponent = Math.max(biased, 1) - 1075
  let mantissa = bits >> 63n ? -magnitude : magnitude
  if (mantissa === 0n) return { mantissa: 0n, exponent: 0 }
  while ((mantissa & 1n) === 0n) {
    mantissa >>= 1n
    exponent += 1
  }
  return { mantissa, exponent }
}

/** Number of bits of |value|. */
export function bitLength(value: bigint): number {
  const magnitude = value < 0n ? -value : value
  if (magnitude === 0n) return 0
  const text = magnitude.toString(16)
  return text.length * 4 - Math.clz32(Number.parseInt(text[0]!, 16)) + 28
}

/** value * 2^shift, rounded towards minus infinity for a negative shift. */
export function shifted(value: bigint, shift: number): bigint {
  return shift >= 0 ? value << BigInt(shift) : value >> BigInt(-shift)
}

/** A big integer as `significand * 2^exponent` with 0.5 <= |significand| < 1, significand a double (relative error below 2^-53). */
export function splitBig(value: bigint): { significand: number, exponent: number } {
  const length = bitLength(value)
  if (length === 0) return { significand: 0, exponent: 0 }
  const excess = length - 62
  const head = excess > 0 ? value >> BigInt(excess) : value << BigInt(-excess)
  return { significand: Number(head) / 2 ** 62, exponent: length }
}

/** mantissa * 2^exponent as a double. */
export function dyadicToNumber(mantissa: bigint, exponent: number): number {
  const { significand, exponent: length } = splitBig(mantissa)
  const total = length + exponent
  if (total > 1000 || total < -1000) return significand * 2 ** (total > 0 ? 1000 : -1000) * 2 ** (total - (total > 0 ? 1000 : -1000))
  return significand * 2 ** total
}

/** numerator / denominator as `significand * 2^exponent` of 100 correct bits, then rounded: for ratios out of the double range too. */
export function bigRatio(numerator: bigint, denominator: bigint): { significand: number, exponent: number } {
  if (denominator === 0n) throw new RangeError('division by zero')
  const shift = bitLength(denominator) - bitLength(numerator) + 100
  const { significand, exponent } = splitBig(shifted(numerator, shift) / denominator)
  return { significand, exponent: exponent - shift }
}

/** Natural logarithm of a positive ratio of big integers. */
export function logOfBigRatio(numerator: bigint, denominator: bigint): number {
  const { significand, exponent } = bigRatio(numerator, denominator)
  // near 1 the logarithm is taken of the difference, so that nothing cancels
  const ratio = exponent > -1000 && exponent < 1000 ? significand * 2 ** exponent : 0
  if (ratio > 0.5 && ratio < 2) {
    const difference = bigRatio(numerator - denominator, denominator)
    return Math.log1p(numerator === denominator ? 0 : difference.significand * 2 ** difference.exponent)
  }
  return Math.log(significand) + exponent * Math.LN2
}

/** Largest integer whose square is at most `value`. */
export function bigSquareRoot(value: bigint): bigint {
  if (value < 0n) throw new RangeError('square root of a negative number')
  if (value < 2n) return value
  let guess = 1n << BigInt(Math.ceil(bitLength(value) / 2))
  for (;;) {
    const next = (guess + value / guess) >> 1n
    if (next >= guess) return guess
    guess = next
  }
}
