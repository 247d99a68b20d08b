import { bitLength } from './bitLength'
import { exactFromDoubles } from './exactFromDoubles'
import type { ExactPolynomial } from './ExactPolynomial'
import { splitDouble } from './splitDouble'

/** Coefficients of P(2^shift x) / 2^scale as double-doubles; the largest magnitude lies in [1, 2). */
export interface ShiftedCoefficients {
  high: Float64Array
  low: Float64Array
  scale: number
}

/**
 * A real polynomial for evaluation near points of very different size: mantissas and exponents apart, so that neither
 * coefficients nor powers leave the range of doubles, and the exact integers at hand for more precision.
 */
export class ScaledPolynomial {
  readonly degree: number
  /** Mantissa of each coefficient, magnitude in [1, 2) or zero, as an unevaluated sum of two doubles (error below 2^-105). */
  private readonly high: Float64Array
  private readonly low: Float64Array
  private readonly exponent: Int32Array
  private readonly shifted = new Map<number, ShiftedCoefficients>()
  private exactForm: ExactPolynomial | undefined
  private readonly makeExact: () => ExactPolynomial

  private constructor(degree: number, makeExact: () => ExactPolynomial) {
    this.degree = degree
    this.high = new Float64Array(degree + 1)
    this.low = new Float64Array(degree + 1)
    this.exponent = new Int32Array(degree + 1)
    this.makeExact = makeExact
  }

  /** From finite doubles, lowest power first, the last one not zero. */
  static fromDoubles(ascending: ArrayLike<number>): ScaledPolynomial {
    const polynomial = new ScaledPolynomial(ascending.length - 1, () => exactFromDoubles(ascending))
    for (let k = 0; k < ascending.length; k++) {
      const { mantissa, exponent } = splitDouble(ascending[k] as number)
      if (mantissa === 0) continue
      const leading = Math.floor(Math.log2(Math.abs(mantissa)) + 1e-14)
      polynomial.high[k] = mantissa * 2 ** -leading
      polynomial.exponent[k] = exponent + leading
    }
    return polynomial
  }

  static fromExact(exact: ExactPolynomial): ScaledPolynomial {
    const polynomial = new ScaledPolynomial(exact.coefficients.length - 1, () => exact)
    exact.coefficients.forEach((coefficient, k) => {
      if (coefficient === 0n) return
      const leading = bitLength(coefficient) - 1
      const top = leading > 127 ? coefficient >> BigInt(leading - 127) : coefficient << BigInt(127 - leading)
      const high = Number(top)
      polynomial.high[k] = high * 2 ** -127
      polynomial.low[k] = Number(top - BigInt(high)) * 2 ** -127
      polynomial.exponent[k] = leading + exact.exponent
    })
    return polynomial
  }

  get exact(): ExactPolynomial {
    this.exactForm ??= this.makeExact()
    return this.exactForm
  }

  /** log2 of the magnitude of coefficient k; -Infinity for zero. */
  logMagnitude(k: number): number {
    return Math.log2(Math.abs(this.high[k] as number)) + (this.exponent[k] as number)
  }

  /** P(2^shift x) / 2^scale; coefficients below 2^-1000 of the largest count as zero there (they are under every error bound used). */
  at(shift: number): ShiftedCoefficients {
    const known = this.shifted.get(shift)
    if (known) return known
    let scale = -Infinity
    for (let k = 0; k <= this.degree; k++) {
      if (this.high[k] !== 0) scale = Math.max(scale, (this.exponent[k] as number) + shift * k)
    }
    const result = { high: new Float64Array(this.degree + 1), low: new Float64Array(this.degree + 1), scale }
    for (let k = 0; k <= this.degree; k++) {
      const relative = (this.exponent[k] as number) + shift * k - scale
      if (this.high[k] === 0 || relative < -900) continue
      result.high[k] = (this.high[k] as number) * 2 ** relative
      result.low[k] = (this.low[k] as number) * 2 ** relative
    }
    this.shifted.set(shift, result)
    return result
  }
}
