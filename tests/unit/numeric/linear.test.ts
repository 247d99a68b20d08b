import { describe, expect, it } from 'vitest'
import { balanceSystem } from '#shared/numeric/linear/balanceSystem'
import { ComplexResolvent } from '#shared/numeric/linear/ComplexResolvent'
import { hessenbergEigenvalues } from '#shared/numeric/linear/hessenbergEigenvalues'
import { realInverse } from '#shared/numeric/linear/realInverse'

/** Eigenvalues in order of real part, then of imaginary part. */
function eigenvalues(rows: number[][]): [number, number][] {
  const { re, im } = hessenbergEigenvalues(Float64Array.from(rows.flat()), rows.length)!
  return Array.from(re, (value, k): [number, number] => [value, im[k]!]).sort((a, b) => a[0] - b[0] || a[1] - b[1])
}

/** Upper Hessenberg companion matrix of a monic polynomial, highest power first without its leading 1. */
const companionOf = (coefficients: number[]) => coefficients.map((_, i) => coefficients.map((value, j) => i === 0 ? -value : i === j + 1 ? 1 : 0))

describe('eigenvalues of a Hessenberg matrix', () => {
  it('of no, one and two rows', () => {
    expect(hessenbergEigenvalues(new Float64Array(0), 0)!.re).toHaveLength(0)
    expect(eigenvalues([[-3]])).toEqual([[-3, 0]])
    expect(eigenvalues([[0, -4], [1, 0]])).toEqual([[0, -2], [0, 2]])
    expect(eigenvalues([[1, 5], [0, 2]])).toEqual([[1, 0], [2, 0]])
  })

  it('of nothing but zeros are zeros, also with ones above the diagonal', () => {
    expect(eigenvalues([[0, 0, 0], [0, 0, 0], [0, 0, 0]])).toEqual([[0, 0], [0, 0], [0, 0]])
    expect(eigenvalues([[0, 1, 0], [0, 0, 1], [0, 0, 0]])).toEqual([[0, 0], [0, 0], [0, 0]])
  })

  it('are the roots of its polynomial: 1 to 6', () => {
    // (x - 1)(x - 2)...(x - 6)
    eigenvalues(companionOf([-21, 175, -735, 1624, -1764, 720])).forEach(([re, im], k) => {
      expect(re).toBeCloseTo(k + 1, 9)
      expect(im).toBe(0)
    })
  })

  it('of a cyclic shift are the roots of unity, on which the shifts of the algorithm go round in circles', () => {
    const n = 8
    const found = eigenvalues(companionOf([0, 0, 0, 0, 0, 0, 0, -1]))
    expect(found).toHaveLength(n)
    for (const [re, im] of found) {
      expect(Math.hypot(re, im)).toBeCloseTo(1, 12)
      expect(Math.cos(n * Math.atan2(im, re))).toBeCloseTo(1, 10)
    }
  })
})

describe('the resolvent at a point', () => {
  // a Hilbert matrix times 360360 has whole numbers; inverse by M.-D. Choi, 'Tricks or treats with the Hilbert matrix', American Mathematical Monthly 90 (1983)
  const n = 8
  const whole = 360360
  const hilbert = Float64Array.from({ length: n * n }, (_, k) => -whole / (Math.floor(k / n) + (k % n) + 1))
  const choose = (top: number, bottom: number): number => bottom === 0 ? 1 : choose(top - 1, bottom - 1) * top / bottom
  const inverseEntry = (i: number, j: number) =>
    (-1) ** (i + j) * (i + j - 1) * choose(n + i - 1, n - j) * choose(n + j - 1, n - i) * choose(i + j - 2, i - 1) ** 2

  it('solves precisely what doubles alone solve to five digits', () => {
    const resolvent = new ComplexResolvent(hilbert, 0, 0)
    const b = new Float64Array(n)
    b[0] = whole
    const { re, reLow, im } = resolvent.solvePrecisely(b)
    for (let i = 0; i < n; i++) {
      expect(Math.abs((re[i]! - inverseEntry(i + 1, 1)) + reLow[i]!) / Math.abs(inverseEntry(i + 1, 1))).toBeLessThan(1e-20)
      expect(im[i]).toBe(0)
    }
  })

  it('at a complex point and transposed: 2 by 2 by hand', () => {
    // s = j, A = [1 2; 3 4]: det(sI - A) = (j - 1)(j - 4) - 6 = -3 - 5j
    const resolvent = new ComplexResolvent(Float64Array.of(1, 2, 3, 4), 0, 1)
    const determinant = { re: -3, im: -5 }
    const over = (re: number, im: number) => [(re * determinant.re + im * determinant.im) / 34, (im * determinant.re - re * determinant.im) / 34]
    const x = resolvent.solve(Float64Array.of(1, 0), new Float64Array(2))
    const y = resolvent.solveTransposed(Float64Array.of(1, 0))
    // first column (j - 4, 3), first row (j - 4, 2)
    expect([x.re[0], x.im[0]]).toEqual(over(-4, 1).map(value => expect.closeTo(value, 14)))
    expect([x.re[1], x.im[1]]).toEqual(over(3, 0).map(value => expect.closeTo(value, 14)))
    expect([y.re[1], y.im[1]]).toEqual(over(2, 0).map(value => expect.closeTo(value, 14)))
  })

  it('on the real axis has an inverse, but none at an eigenvalue', () => {
    expect(Array.from(realInverse(Float64Array.of(0, 1, 0, 0), 2, 2)!)).toEqual([0.5, 0.25, 0, 0.5])
    expect(realInverse(Float64Array.of(0, 1, 0, 0), 2, 0)).toBeNull()
  })
})

describe('balancing', () => {
  it('scales by powers of two alone and brings rows and columns to like sizes', () => {
    const { a, b, c, exponents } = balanceSystem([[0, 1], [-1e8, -20]], [[0], [3]], [[5, 0]])
    expect(Math.abs(Math.log2(a[0]![1]! / -a[1]![0]!))).toBeLessThanOrEqual(1)
    expect(a[0]![1]! * a[1]![0]!).toBe(-1e8)
    expect(a[1]![1]).toBe(-20)
    expect(b[1]![0]! * 2 ** exponents[1]!).toBe(3)
    expect(c[0]![0]! * 2 ** -exponents[0]!).toBe(5)
  })

  it('ends where states act in one direction only, and leaves them', () => {
    const given = [[-1, 1e6, 0], [0, -2, 1e6], [0, 0, -3]]
    const { a } = balanceSystem(given, [[0], [0], [1]], [[1, 0, 0]])
    expect(a.map((row, i) => row[i])).toEqual([-1, -2, -3])
    expect(a[0]![1]! * a[1]![2]!).toBe(1e12)
  })
})
