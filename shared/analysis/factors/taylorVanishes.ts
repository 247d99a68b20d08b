import type { RefinedRoots } from '../../numeric/extended/refineRoots'
import type { ScaledPolynomial } from '../../numeric/extended/ScaledPolynomial'
import { BACKWARD_ERROR_UNITS } from './BoundaryRule'

/**
 * True when the first m Taylor coefficients of a polynomial at a point, |P^(j)(r0) / j!| for j < m, are each at most
 * 4 u sum_k C(k, j) |a_k| |r0|^(k - j), u = 2^-53: some polynomial with coefficients a few units in the last place away
 * may have a root of multiplicity m there. The Taylor coefficients are taken from the accurate roots, as the lowest
 * coefficients of lead prod (x + (r0 - r_i)), where nothing cancels that matters.
 */
export function taylorVanishes(coefficients: ScaledPolynomial, roots: RefinedRoots, re: number, im: number, m: number): boolean {
  const n = coefficients.degree
  const shift = Math.round(Math.log2(Math.max(Math.abs(re), Math.abs(im))))
  const scaling = 2 ** -shift
  const { high, scale } = coefficients.at(shift)
  const seriesRe = new Float64Array(m)
  const seriesIm = new Float64Array(m)
  seriesRe[0] = 1
  let exponent = coefficients.logMagnitude(n) + shift * n - scale
  for (let i = 0; i < n; i++) {
    const a = (re - (roots.re[i] as number)) * scaling
    const b = (im - (roots.im[i] as number)) * scaling
    let largest = 0
    for (let j = m - 1; j >= 0; j--) {
      const p = seriesRe[j] as number
      const q = seriesIm[j] as number
      seriesRe[j] = p * a - q * b + (j > 0 ? seriesRe[j - 1] as number : 0)
      seriesIm[j] = p * b + q * a + (j > 0 ? seriesIm[j - 1] as number : 0)
      largest = Math.max(largest, Math.abs(seriesRe[j] as number), Math.abs(seriesIm[j] as number))
    }
    if (largest === 0) return true
    if (largest > 1e100 || largest < 1e-100) {
      const power = Math.round(Math.log2(largest))
      exponent += power
      for (let j = 0; j < m; j++) {
        seriesRe[j] = (seriesRe[j] as number) * 2 ** -power
        seriesIm[j] = (seriesIm[j] as number) * 2 ** -power
      }
    }
  }
  const modulus = Math.hypot(re, im) * scaling
  for (let j = 0; j < m; j++) {
    let size = 0
    let binomial = 1
    let power = 1
    for (let k = j; k <= n; k++) {
      size += binomial * Math.abs(high[k] as number) * power
      binomial *= (k + 1) / (k + 1 - j)
      power *= modulus
    }
    const value = Math.hypot(seriesRe[j] as number, seriesIm[j] as number)
    if (Math.log2(value) + exponent > Math.log2(BACKWARD_ERROR_UNITS * size) - 53) return false
  }
  return true
}
