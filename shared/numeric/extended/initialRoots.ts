import type { ScaledPolynomial } from './ScaledPolynomial'

/**
 * Starting points for a simultaneous root iteration: circles whose radii are the slopes of the Newton polygon of the
 * coefficients (D. A. Bini, 'Numerical computation of polynomial zeros by means of Aberth's method', Numerical Algorithms 13, 1996).
 * The constant coefficient must not be zero.
 */
export function initialRoots(polynomial: ScaledPolynomial): { re: Float64Array, im: Float64Array } {
  const n = polynomial.degree
  const hull: number[] = []
  for (let k = 0; k <= n; k++) {
    const level = polynomial.logMagnitude(k)
    if (level === -Infinity) continue
    while (hull.length >= 2) {
      const i = hull[hull.length - 2] as number
      const j = hull[hull.length - 1] as number
      const rise = (polynomial.logMagnitude(j) - polynomial.logMagnitude(i)) / (j - i)
      if ((level - polynomial.logMagnitude(j)) / (k - j) < rise) break
      hull.pop()
    }
    hull.push(k)
  }
  const re = new Float64Array(n)
  const im = new Float64Array(n)
  let index = 0
  for (let segment = 0; segment + 1 < hull.length; segment++) {
    const i = hull[segment] as number
    const j = hull[segment + 1] as number
    const radius = 2 ** ((polynomial.logMagnitude(i) - polynomial.logMagnitude(j)) / (j - i))
    for (let m = 0; m < j - i; m++, index++) {
      const angle = 2 * Math.PI * (m / (j - i) + segment / n) + 0.7
      re[index] = radius * Math.cos(angle)
      im[index] = radius * Math.sin(angle)
    }
  }
  return { re, im }
}
