import { bitLength, dyadicToNumber, logOfBigRatio, splitBig, type Dyadic } from './dyadic'
import { integerPolynomial, type IntegerPolynomial } from './integerPolynomial'

/** p at a dyadic point, exactly. */
export function dyadicValue(p: IntegerPolynomial, at: Dyadic): Dyadic {
  if (p.length === 0) return { mantissa: 0n, exponent: 0 }
  return { mantissa: integerPolynomial.valueAt(p, at.mantissa, at.exponent), exponent: at.exponent < 0 ? at.exponent * (p.length - 1) : 0 }
}

export function dyadicProduct(a: Dyadic, b: Dyadic): Dyadic {
  return { mantissa: a.mantissa * b.mantissa, exponent: a.exponent + b.exponent }
}

/** Natural logarithm of a / b, both positive. */
export function logOfDyadicRatio(a: Dyadic, b: Dyadic): number {
  const shift = a.exponent - b.exponent
  return shift >= 0 ? logOfBigRatio(a.mantissa << BigInt(shift), b.mantissa) : logOfBigRatio(a.mantissa, b.mantissa << BigInt(-shift))
}

/** a / b as a double, within a few units in the last place. */
export function dyadicRatio(a: Dyadic, b: Dyadic): number {
  if (a.mantissa === 0n) return 0
  const shift = bitLength(b.mantissa) - bitLength(a.mantissa) + 80
  const quotient = (shift >= 0 ? a.mantissa << BigInt(shift) : a.mantissa >> BigInt(-shift)) / b.mantissa
  return dyadicToNumber(quotient, a.exponent - b.exponent - shift)
}

/** Angle of x + jy in radians, within a few units in the last place. */
export function angleOf(y: Dyadic, x: Dyadic): number {
  const a = splitBig(y.mantissa)
  const b = splitBig(x.mantissa)
  const ea = a.significand === 0 ? Number.NEGATIVE_INFINITY : a.exponent + y.exponent
  const eb = b.significand === 0 ? Number.NEGATIVE_INFINITY : b.exponent + x.exponent
  const top = Math.max(ea, eb)
  return Math.atan2(a.significand * 2 ** Math.max(-1070, ea - top), b.significand * 2 ** Math.max(-1070, eb - top))
}
