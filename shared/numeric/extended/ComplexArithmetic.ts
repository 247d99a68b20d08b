import { bitLength } from './bitLength'
import type { ComplexFloat } from './ComplexFloat'
import type { Rational } from './Rational'
import { splitDouble } from './splitDouble'

const LOG2_E = Math.LOG2E

/**
 * Complex floating-point arithmetic with mantissas of a chosen number of bits and exponents without bound. Each operation errs by at most
 * 2^(2 - bits) of the size of its result (its larger part); nothing is rounded that fits.
 */
export class ComplexArithmetic {
  static readonly zero: ComplexFloat = { re: 0n, im: 0n, exponent: 0 }
  static readonly one: ComplexFloat = { re: 1n, im: 0n, exponent: 0 }

  constructor(readonly bits: number) {}

  /** Shortens mantissas that are too long. */
  round(re: bigint, im: bigint, exponent: number): ComplexFloat {
    const excess = Math.max(bitLength(re), bitLength(im)) - this.bits
    if (excess <= 0) return { re, im, exponent }
    const cut = BigInt(excess)
    const half = 1n << (cut - 1n)
    return { re: (re + half) >> cut, im: (im + half) >> cut, exponent: exponent + excess }
  }

  fromRational(value: Rational): ComplexFloat {
    const shift = Math.max(0, this.bits + 2 - (bitLength(value.numerator) - bitLength(value.denominator)))
    return value.denominator === 1n
      ? this.round(value.numerator, 0n, 0)
      : this.round((value.numerator << BigInt(shift)) / value.denominator, 0n, -shift)
  }

  fromDoubles(re: number, im: number): ComplexFloat {
    const a = splitDouble(re)
    const b = splitDouble(im)
    const exponent = Math.min(re === 0 ? b.exponent : a.exponent, im === 0 ? a.exponent : b.exponent)
    return this.round(
      re === 0 ? 0n : BigInt(a.mantissa) << BigInt(a.exponent - exponent),
      im === 0 ? 0n : BigInt(b.mantissa) << BigInt(b.exponent - exponent),
      exponent,
    )
  }

  add(a: ComplexFloat, b: ComplexFloat): ComplexFloat {
    if (isZero(a)) return b
    if (isZero(b)) return a
    const gap = a.exponent - b.exponent
    const far = 2 * this.bits + 8
    if (gap > far) return a
    if (gap < -far) return b
    if (gap >= 0) {
      const up = BigInt(gap)
      return this.round((a.re << up) + b.re, (a.im << up) + b.im, b.exponent)
    }
    const up = BigInt(-gap)
    return this.round(a.re + (b.re << up), a.im + (b.im << up), a.exponent)
  }

  subtract(a: ComplexFloat, b: ComplexFloat): ComplexFloat {
    return this.add(a, { re: -b.re, im: -b.im, exponent: b.exponent })
  }

  multiply(a: ComplexFloat, b: ComplexFloat): ComplexFloat {
    if (a.im === 0n) return this.round(a.re * b.re, b.im === 0n ? 0n : a.re * b.im, a.exponent + b.exponent)
    if (b.im === 0n) return this.round(a.re * b.re, a.im * b.re, a.exponent + b.exponent)
    return this.round(a.re * b.re - a.im * b.im, a.re * b.im + a.im * b.re, a.exponent + b.exponent)
  }

  /** @throws RangeError for a division by zero */
  divide(a: ComplexFloat, b: ComplexFloat): ComplexFloat {
    const size = b.re * b.re + b.im * b.im
    if (size === 0n) throw new RangeError('division by zero')
    const re = a.re * b.re + a.im * b.im
    const im = a.im * b.re - a.re * b.im
    const shift = Math.max(0, this.bits + 2 + bitLength(size) - Math.max(bitLength(re), bitLength(im)))
    return this.round((re << BigInt(shift)) / size, (im << BigInt(shift)) / size, a.exponent - b.exponent - shift)
  }

  /**
   * e^z by halving the argument until a Taylor series of few terms gives it and squaring as often (R. P. Brent, 'Fast multiple-precision
   * evaluation of elementary functions', J. ACM 23, 1976); 0 where it is below 2^(-3 bits). Right to 2^(4 - bits) of its size as far as z itself is exact.
   *
   * @throws RangeError where |z| is 2^40 or more, or Re z so large that e^z has no use
   */
  exponential(z: ComplexFloat): ComplexFloat {
    if (isZero(z)) return ComplexArithmetic.one
    const magnitude = logSize(z)
    const { re: real } = toDoubles(z)
    if (real * LOG2_E < -3 * this.bits) return ComplexArithmetic.zero
    if (magnitude > 40 || real > 1e5) throw new RangeError('the exponential leaves the range of numbers that can be held')
    const halvings = Math.max(0, Math.ceil(magnitude) + 2 + Math.floor(Math.sqrt(this.bits) / 2))
    const work = this.bits + halvings + 16 + Math.max(0, Math.ceil(-real * LOG2_E))
    const scale = BigInt(work)
    const x = place(z.re, z.exponent - halvings + work)
    const y = place(z.im, z.exponent - halvings + work)
    let re = 1n << scale
    let im = 0n
    let termRe = re
    let termIm = 0n
    for (let k = 1; termRe > 1n || termRe < -1n || termIm > 1n || termIm < -1n; k++) {
      const divisor = BigInt(k)
      const next = ((termRe * x - termIm * y) >> scale) / divisor
      termIm = ((termRe * y + termIm * x) >> scale) / divisor
      termRe = next
      re += termRe
      im += termIm
    }
    const more = scale - 1n
    for (let k = 0; k < halvings; k++) {
      const next = ((re - im) * (re + im)) >> scale
      im = (re * im) >> more
      re = next
    }
    return this.round(re, z.im === 0n ? 0n : im, -work)
  }
}

export function isZero(a: ComplexFloat): boolean {
  return a.re === 0n && a.im === 0n
}

/** log2 of the larger part, rounded up; -Infinity for zero. */
export function logSize(a: ComplexFloat): number {
  const length = Math.max(bitLength(a.re), bitLength(a.im))
  return length === 0 ? -Infinity : length + a.exponent
}

/** Both parts as doubles. */
export function toDoubles(a: ComplexFloat): { re: number, im: number } {
  return { re: toDouble(a.re, a.exponent), im: toDouble(a.im, a.exponent) }
}

/** value * 2^power to the nearest integer. */
export function place(value: bigint, power: number): bigint {
  if (power >= 0) return value << BigInt(power)
  const cut = BigInt(-power)
  return (value + (1n << (cut - 1n))) >> cut
}

function toDouble(value: bigint, power: number): number {
  const excess = bitLength(value) - 64
  if (excess <= 0) return Number(value) * 2 ** power
  const rest = power + excess
  return Number(value >> BigInt(excess)) * 2 ** Math.trunc(rest / 2) * 2 ** (rest - Math.trunc(rest / 2))
}
