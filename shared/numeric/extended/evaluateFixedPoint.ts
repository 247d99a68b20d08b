import { bitLength } from './bitLength'
import type { ScaledPolynomial } from './ScaledPolynomial'
import { splitDouble } from './splitDouble'

/**
 * Horner's rule in fixed-point integers at (re + j im) * 2^shift with |re + j im| at most 2: writes the real and imaginary
 * part of P / 2^scale, scale as `polynomial.at(shift)` has it, to `out` as doubles (relative rounding 2^-53).
 * Absolute error at most (degree + 1)^2 2^(3 - bits) max(1, |x|)^degree: coefficients below 2, one unit lost by each
 * rounding, and |p| <= 2 (degree + 1) max(1, |x|)^degree times the unit lost where the point itself was cut to `bits`.
 */
export function evaluateFixedPoint(polynomial: ScaledPolynomial, shift: number, re: number, im: number, bits: number, out: Float64Array): void {
  const { coefficients, exponent } = polynomial.exact
  const { scale } = polynomial.at(shift)
  const n = polynomial.degree
  // The point is exact: its mantissas are integers over 2^pointBits.
  const a = splitDouble(re)
  const b = splitDouble(im)
  const pointBits = Math.max(0, a.mantissa === 0 ? 0 : -a.exponent, b.mantissa === 0 ? 0 : -b.exponent)
  const kept = Math.min(pointBits, bits)
  const x = place(BigInt(a.mantissa), a.exponent + kept)
  const y = place(BigInt(b.mantissa), b.exponent + kept)
  const cut = BigInt(kept)
  let p = 0n
  let q = 0n
  for (let k = n; k >= 0; k--) {
    const c = coefficients[k] as bigint
    const next = c === 0n ? 0n : place(c, exponent + shift * k - scale + bits)
    const t = ((p * x - q * y) >> cut) + next
    q = (p * y + q * x) >> cut
    p = t
  }
  out[0] = toDouble(p, -bits)
  out[1] = toDouble(q, -bits)
}

/** value * 2^power, rounded down. */
function place(value: bigint, power: number): bigint {
  return power >= 0 ? value << BigInt(power) : value >> BigInt(-power)
}

function toDouble(value: bigint, power: number): number {
  const excess = bitLength(value) - 64
  if (excess <= 0) return Number(value) * 2 ** power
  // two steps, so that the power of two alone never leaves the range of doubles
  const rest = power + excess
  return Number(value >> BigInt(excess)) * 2 ** Math.trunc(rest / 2) * 2 ** (rest - Math.trunc(rest / 2))
}
