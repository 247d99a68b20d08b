import { describe, expect, it } from 'vitest'
import type { ExactPolynomial } from '#shared/numeric/extended/ExactPolynomial'
import { exactFromDoubles } from '#shared/numeric/extended/exactFromDoubles'
import { multiplyExact } from '#shared/numeric/extended/multiplyExact'
import { polynomialRoots } from '#shared/numeric/extended/polynomialRoots'
import { refineRoots } from '#shared/numeric/extended/refineRoots'
import { rootsAboutOne } from '#shared/numeric/extended/rootsAboutOne'
import { ScaledPolynomial } from '#shared/numeric/extended/ScaledPolynomial'

const productOf = (factors: number[][]): ExactPolynomial => factors.map(exactFromDoubles).reduce(multiplyExact)

/** Pairs e^((-zeta + j) w T) of modes of 1 to 100 rad/s. */
function crowd(count: number, sampleTime: number): { factors: number[][], roots: { re: number, im: number }[] } {
  const roots = Array.from({ length: count }, (_, k) => {
    const w = 100 ** (k / (count - 1)) * sampleTime
    return { re: Math.exp(-0.002 * w) * Math.cos(w), im: Math.exp(-0.002 * w) * Math.sin(w) }
  })
  // the square of the modulus is not the square of the root's double, but near enough for the test's tolerance
  return { factors: roots.map(({ re, im }) => [re * re + im * im, -2 * re, 1]), roots }
}

describe('roots of polynomials in z that crowd about 1', () => {
  it('1 as a root is left to be divided out', () => {
    expect(rootsAboutOne(productOf([[-1, 1], [-0.5, 1]]))).toBeNull()
  })

  it('29 lightly damped pairs and a zero at -3.7, sampled at 10 kHz, are found', () => {
    const { factors, roots } = crowd(29, 1e-4)
    const found = polynomialRoots(productOf([...factors, [3.7, 1]]), true)
    for (const { re, im } of roots) {
      const nearest = Math.min(...Array.from(found.re, (x, k) => Math.hypot(x - re, (found.im[k] as number) - im)))
      // a unit of rounding in |z|^2 moves a root by that over its distance from the real axis
      expect(nearest).toBeLessThan(4 * Number.EPSILON / im)
    }
    expect(Math.min(...Array.from(found.re, x => Math.abs(x + 3.7)))).toBeLessThan(1e-15 * 4)
  })

  it('the usual way finds the same roots where both can', () => {
    const { factors } = crowd(4, 0.05)
    const polynomial = productOf(factors)
    const sorted = (aboutOne: boolean) => Array.from(polynomialRoots(polynomial, aboutOne).re).sort((a, b) => a - b)
    const [a, b] = [sorted(true), sorted(false)]
    a.forEach((value, k) => expect(Math.abs(value - (b[k] as number))).toBeLessThan(4e-16))
  })
})

describe('roots that crowd about 1 so closely that the product of their distances leaves the range of doubles', () => {
  const { factors, roots } = crowd(74, 0.002)
  const polynomial = productOf(factors)

  it('are found in powers of z - 1', () => {
    const found = polynomialRoots(polynomial, true)
    for (const { re, im } of roots) {
      expect(Math.min(...Array.from(found.re, (x, k) => Math.hypot(x - re, (found.im[k] as number) - im)))).toBeLessThan(4 * Number.EPSILON / im)
    }
  })

  it('are refused in powers of z, where their corrections could not be known, rather than given wrong', () => {
    const start = { re: Float64Array.from(roots.flatMap(({ re }) => [re, re])), im: Float64Array.from(roots.flatMap(({ im }) => [im, -im])) }
    expect(() => refineRoots(ScaledPolynomial.fromExact(polynomial), start)).toThrow('the roots crowd too closely about one point')
  })
})
