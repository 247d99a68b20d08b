import { bitLength } from './bitLength'
import { integerGcd } from './integerGcd'
import { splitDouble } from './splitDouble'

/** An exact fraction, reduced, denominator positive. */
export class Rational {
  static readonly zero = new Rational(0n, 1n)
  static readonly one = new Rational(1n, 1n)

  private constructor(readonly numerator: bigint, readonly denominator: bigint) {}

  /** @throws RangeError for a denominator of zero */
  static of(numerator: bigint, denominator: bigint): Rational {
    if (denominator === 0n) throw new RangeError('division by zero')
    const divisor = integerGcd(numerator, denominator) * (denominator < 0n ? -1n : 1n)
    return divisor === 1n ? new Rational(numerator, denominator) : new Rational(numerator / divisor, denominator / divisor)
  }

  /** The double itself, exactly. */
  static fromDouble(value: number): Rational {
    const { mantissa, exponent } = splitDouble(value)
    return exponent >= 0
      ? new Rational(BigInt(mantissa) << BigInt(exponent), 1n)
      : Rational.of(BigInt(mantissa), 1n << BigInt(-exponent))
  }

  plus(other: Rational): Rational {
    return Rational.of(this.numerator * other.denominator + other.numerator * this.denominator, this.denominator * other.denominator)
  }

  minus(other: Rational): Rational {
    return this.plus(other.negated())
  }

  times(other: Rational): Rational {
    return Rational.of(this.numerator * other.numerator, this.denominator * other.denominator)
  }

  /** @throws RangeError for a division by zero */
  over(other: Rational): Rational {
    return Rational.of(this.numerator * other.denominator, this.denominator * other.numerator)
  }

  negated(): Rational {
    return new Rational(-this.numerator, this.denominator)
  }

  /** @throws RangeError for a negative power of zero */
  toPower(exponent: number): Rational {
    const size = BigInt(Math.abs(exponent))
    const power = new Rational(this.numerator ** size, this.denominator ** size)
    return exponent >= 0 ? power : Rational.one.over(power)
  }

  /** -1, 0 or 1 */
  get sign(): number {
    return this.numerator > 0n ? 1 : this.numerator < 0n ? -1 : 0
  }

  /** Bits of the longer of the two integers. */
  get bits(): number {
    return Math.max(bitLength(this.numerator), bitLength(this.denominator))
  }

  /** Nearest double, to within one unit in the last place; Infinity or 0 where it leaves their range. */
  toNumber(): number {
    if (this.numerator === 0n) return 0
    const size = bitLength(this.numerator) - bitLength(this.denominator)
    // a quotient of 64 or 65 bits
    const shift = 64 - size
    const quotient = shift >= 0
      ? (this.numerator << BigInt(shift)) / this.denominator
      : this.numerator / (this.denominator << BigInt(-shift))
    const half = Math.trunc(-shift / 2)
    return Number(quotient) * 2 ** half * 2 ** (-shift - half)
  }
}
