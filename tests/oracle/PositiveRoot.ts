import { bigSquareRoot, bitLength, dyadicToNumber, shifted } from './dyadic'
import { integerPolynomial, type IntegerPolynomial } from './integerPolynomial'

/**
 * The one root of a square-free polynomial in an open interval with dyadic ends of opposite signs (or a root met
 * exactly: both ends equal). The interval can be narrowed without end; the root never leaves it.
 */
export class PositiveRoot {
  readonly polynomial: IntegerPolynomial
  private splits = 4

  constructor(
    polynomial: IntegerPolynomial,
    private low: bigint,
    private high: bigint,
    private exponent: number,
  ) {
    this.polynomial = polynomial
    if (low === high) return
    // a neighbouring root that is itself dyadic may stand on an end: its factor is taken out
    for (const end of [low, high]) {
      if (integerPolynomial.signAt(this.polynomial, end, exponent) !== 0) continue
      const factor = exponent >= 0 ? [-(end << BigInt(exponent)), 1n] : [-end, 1n << BigInt(-exponent)]
      this.polynomial = integerPolynomial.exactQuotient(this.polynomial, factor)
    }
  }

  /** Ends of the interval: low * 2^exponent < root < high * 2^exponent. */
  get ends() {
    return { low: this.low, high: this.high, exponent: this.exponent }
  }

  private bisect(): void {
    const middle = this.low + this.high
    this.exponent -= 1
    this.low *= 2n
    this.high *= 2n
    const sign = integerPolynomial.signAt(this.polynomial, middle, this.exponent)
    if (sign === 0) this.low = this.high = middle
    else if (sign === integerPolynomial.signAt(this.polynomial, this.low, this.exponent)) this.low = middle
    else this.high = middle
  }

  /** Quadratic interval refinement (J. Abbott, Quadratic interval refinement for real roots, 2006/2012). */
  private refineOnce(): void {
    const { polynomial } = this
    const parts = 1n << BigInt(this.splits)
    const atLow = integerPolynomial.valueAt(polynomial, this.low, this.exponent)
    const atHigh = integerPolynomial.valueAt(polynomial, this.high, this.exponent)
    const index = atLow * parts / (atLow - atHigh)
    const clamped = index >= parts ? parts - 1n : index
    const width = this.high - this.low
    const exponent = this.exponent - this.splits
    const left = (this.low << BigInt(this.splits)) + clamped * width
    const right = left + width
    const signLeft = integerPolynomial.signAt(polynomial, left, exponent)
    const signRight = integerPolynomial.signAt(polynomial, right, exponent)
    if (signLeft === 0 || signRight === 0) {
      this.low = this.high = signLeft === 0 ? left : right
      this.exponent = exponent
    }
    else if (signLeft !== signRight) {
      this.low = left
      this.high = right
      this.exponent = exponent
      this.splits *= 2
    }
    else {
      this.splits = Math.max(2, this.splits >> 1)
      this.bisect()
    }
  }

  /** Narrows until the width is below 2^-bits of the lower end. */
  refine(bits: number): this {
    // a lower end of zero has no relative width: leave it first
    while (this.low === 0n && this.high !== 0n) this.bisect()
    while (this.low !== this.high && bitLength(this.high - this.low) + bits > bitLength(this.low)) {
      const missing = bitLength(this.high - this.low) + bits - bitLength(this.low)
      this.splits = Math.min(this.splits, Math.max(2, missing + 2))
      this.refineOnce()
    }
    return this
  }

  /**
   * Sign of another polynomial at this root, exactly: by interval Horner evaluation on a narrowing interval; a common root is
   * recognised by the greatest common divisor.
   */
  signOf(q: IntegerPolynomial): -1 | 0 | 1 {
    if (q.length === 0) return 0
    if (this.low === this.high) return integerPolynomial.signAt(q, this.low, this.exponent)
    for (let bits = 80; bits <= 640; bits *= 2) {
      this.refine(bits)
      // narrowing may have met the root itself
      if (this.low === this.high) return integerPolynomial.signAt(q, this.low, this.exponent)
      const sign = this.signOverInterval(q)
      if (sign !== 0) return sign
    }
    const common = integerPolynomial.gcd(this.polynomial, q)
    if (common.length > 1 && this.changesSign(common)) return 0
    for (let bits = 1280; ; bits *= 2) {
      this.refine(bits)
      if (this.low === this.high) return integerPolynomial.signAt(q, this.low, this.exponent)
      const sign = this.signOverInterval(q)
      if (sign !== 0) return sign
    }
  }

  private changesSign(q: IntegerPolynomial): boolean {
    return integerPolynomial.signAt(q, this.low, this.exponent) !== integerPolynomial.signAt(q, this.high, this.exponent)
  }

  private signOverInterval(q: IntegerPolynomial): -1 | 0 | 1 {
    let least = 0n
    let most = 0n
    const step = BigInt(-this.exponent)
    if (this.low === this.high) return integerPolynomial.signAt(q, this.low, this.exponent)
    let power = 0n
    for (let i = q.length - 1; i >= 0; i -= 1) {
      const c = this.exponent < 0 ? q[i]! << power : q[i]!
      const low = this.exponent < 0 ? this.low : this.low << -step
      const high = this.exponent < 0 ? this.high : this.high << -step
      least = (least < 0n ? least * high : least * low) + c
      most = (most < 0n ? most * low : most * high) + c
      power += step
    }
    return least > 0n ? 1 : most < 0n ? -1 : 0
  }

  /** Signs of another polynomial at the two ends. */
  signsAtEnds(q: IntegerPolynomial): [-1 | 0 | 1, -1 | 0 | 1] {
    return [integerPolynomial.signAt(q, this.low, this.exponent), integerPolynomial.signAt(q, this.high, this.exponent)]
  }

  /** A dyadic number within 2^-bits (relative) of the root. */
  approximation(bits: number): { mantissa: bigint, exponent: number } {
    this.refine(bits)
    return { mantissa: this.low + this.high, exponent: this.exponent - 1 }
  }

  /** The root as a double. */
  toNumber(): number {
    const { mantissa, exponent } = this.approximation(70)
    return dyadicToNumber(mantissa, exponent)
  }

  /** The square root of the root, as a dyadic number within 2^-bits (relative). */
  squareRoot(bits: number): { mantissa: bigint, exponent: number } {
    const { mantissa, exponent } = this.approximation(bits + 4)
    let shift = Math.max(0, 2 * bits + 10 - bitLength(mantissa))
    if ((exponent - shift) % 2 !== 0) shift += 1
    return { mantissa: bigSquareRoot(shifted(mantissa, shift)), exponent: (exponent - shift) / 2 }
  }
}
