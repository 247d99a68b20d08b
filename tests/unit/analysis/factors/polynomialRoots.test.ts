import { describe, expect, it } from 'vitest'
import { exactFromDoubles } from '#shared/numeric/extended/exactFromDoubles'
import { multiplyExact } from '#shared/numeric/extended/multiplyExact'
import { polynomialRoots } from '#shared/numeric/extended/polynomialRoots'
import { random } from './polynomials'

/** The exact product of (x - r) and (x^2 - 2 re x + |r|^2) whose roots are doubles. */
const product = (reals: number[], squares: [number, number][] = []) => {
  let result = exactFromDoubles([1])
  for (const root of reals) result = multiplyExact(result, exactFromDoubles([-root, 1]))
  // x^2 + 2 a x + a^2 + b^2 with a and b small enough that all is exact
  for (const [a, b] of squares) result = multiplyExact(result, exactFromDoubles([a * a + b * b, 2 * a, 1]))
  return result
}

describe('polynomialRoots', () => {
  it('finds roots that are doubles exactly, whatever their clustering: sixty lags 0.1 apart (closed form)', () => {
    const roots = Array.from({ length: 60 }, (_, k) => -(k + 1) / 16)
    const found = polynomialRoots(product(roots))
    expect(Array.from(found.re).sort((a, b) => b - a)).toEqual(roots)
    expect(Math.max(...found.correction)).toBeLessThan(1e-15)
    expect(Array.from(found.im)).toEqual(new Array(60).fill(0))
  })

  it('finds where plain doubles see nothing: order 100', () => {
    const roots = Array.from({ length: 100 }, (_, k) => -(k + 1) / 8)
    const found = polynomialRoots(product(roots))
    expect(Array.from(found.re).sort((a, b) => b - a)).toEqual(roots)
  })

  it('keeps pairs exactly conjugate and both parts right to the last bit (closed form, parts of few bits)', () => {
    const next = random(3)
    const pairs = Array.from({ length: 12 }, () => [Math.round(next() * 64 + 1) / 4096, Math.round(next() * 4000 + 20) / 64] as [number, number])
    const found = polynomialRoots(product([], pairs))
    const upper = Array.from(found.im, (im, k) => [found.re[k] as number, im]).filter(root => (root[1] as number) > 0)
    const expected = pairs.map(([a, b]) => [-a, b])
    const byPart = (p: number[], q: number[]) => (p[1] as number) - (q[1] as number)
    expect(upper.sort(byPart)).toEqual(expected.sort(byPart))
  })

  it('tells exact multiplicities: (x - 3)^4 (x + 1/4)^2 x^3 (x + 5)', () => {
    const found = polynomialRoots(product([3, 3, 3, 3, -0.25, -0.25, 0, 0, 0, -5]))
    expect(Array.from(found.re).sort((a, b) => a - b)).toEqual([-5, -0.25, -0.25, 0, 0, 0, 3, 3, 3, 3])
  })

  it('tells roots 1e-12 apart from one double root', () => {
    const close = 1 + 2 ** -40
    const found = polynomialRoots(product([1, close, -2]))
    expect(Array.from(found.re).sort((a, b) => a - b)).toEqual([-2, 1, close])
  })

  it('holds its correction over roots spread by sixty decades', () => {
    const roots = [-(2 ** -100), -1, -(2 ** 100)]
    const found = polynomialRoots(product(roots))
    expect(Array.from(found.re).sort((a, b) => b - a)).toEqual(roots)
  })
})
