import { describe, expect, it } from 'vitest'
import { DoubleDoubleMatrix } from '#shared/numeric/doubleDouble/DoubleDoubleMatrix'
import { Rational } from '#shared/numeric/extended/Rational'

/** Doubles of very different size from a fixed linear congruence. */
function numbers(rows: number, columns: number, seed: number, spread = 20): number[][] {
  let state = seed
  const next = () => {
    state = (state * 1103515245 + 12345) % 2147483648
    return state / 2147483648
  }
  return Array.from({ length: rows }, () => Array.from({ length: columns }, () => (next() - 0.5) * 2 ** Math.round(spread * (next() - 0.5))))
}

const exact = (matrix: DoubleDoubleMatrix, i: number, j: number) =>
  Rational.fromDouble(matrix.high[i * matrix.columns + j]!).plus(Rational.fromDouble(matrix.low[i * matrix.columns + j]!))

/** A matrix whose low parts are filled. */
function full(rows: number, columns: number, seed: number): DoubleDoubleMatrix {
  const matrix = DoubleDoubleMatrix.fromNumbers(numbers(rows, columns, seed))
  const small = numbers(rows, columns, seed + 1, 0)
  for (let k = 0; k < matrix.high.length; k++) matrix.low[k] = matrix.high[k]! * small[Math.floor(k / columns)]![k % columns]! * 2 ** -53
  return matrix
}

function expectNear(value: Rational, expected: Rational, tolerance: number): void {
  expect(Math.abs(value.minus(expected).toNumber())).toBeLessThanOrEqual(tolerance)
}

describe('a matrix of double-doubles', () => {
  it('of no rows or no columns multiplies to zeros', () => {
    const product = DoubleDoubleMatrix.zeros(2, 0).multiply(DoubleDoubleMatrix.fromNumbers([], 3))
    expect(product.toNumbers()).toEqual([[0, 0, 0], [0, 0, 0]])
  })

  it('refuses rows of different length and shapes that do not meet', () => {
    expect(() => DoubleDoubleMatrix.fromNumbers([[1, 2], [3]])).toThrow('row 2 has 1 numbers, 2 are needed')
    expect(() => DoubleDoubleMatrix.identity(2).multiply(DoubleDoubleMatrix.identity(3))).toThrow(RangeError)
    expect(() => DoubleDoubleMatrix.identity(2).add(DoubleDoubleMatrix.identity(3))).toThrow(RangeError)
  })

  it('keeps what doubles lose where sums cancel', () => {
    const one = DoubleDoubleMatrix.fromNumbers([[1]])
    const small = DoubleDoubleMatrix.fromNumbers([[2 ** -80]])
    const back = one.add(small).subtract(one)
    expect(back.high[0]).toBe(2 ** -80)
    expect(back.low[0]).toBe(0)
  })

  it('adds and scales as fractions do, to 2^-100', () => {
    const a = full(3, 4, 5)
    const b = full(3, 4, 77)
    const sum = a.add(b)
    const difference = a.subtract(b)
    const scaled = a.scale(1 / 3, 2 ** -56 / 3)
    const factor = Rational.fromDouble(1 / 3).plus(Rational.fromDouble(2 ** -56 / 3))
    for (let i = 0; i < 3; i++) {
      for (let j = 0; j < 4; j++) {
        const size = Math.abs(a.high[i * 4 + j]!) + Math.abs(b.high[i * 4 + j]!)
        expectNear(exact(sum, i, j), exact(a, i, j).plus(exact(b, i, j)), size * 2 ** -104)
        expectNear(exact(difference, i, j), exact(a, i, j).minus(exact(b, i, j)), size * 2 ** -104)
        expectNear(exact(scaled, i, j), exact(a, i, j).times(factor), size * 2 ** -100)
      }
    }
    expect(exact(a.timesPowerOfTwo(-7), 2, 1).times(Rational.fromDouble(128)).minus(exact(a, 2, 1)).sign).toBe(0)
  })

  it('multiplies as fractions do, within the bound it states', () => {
    const a = full(4, 7, 3)
    const b = full(7, 3, 9)
    const product = a.multiply(b)
    for (let i = 0; i < 4; i++) {
      for (let j = 0; j < 3; j++) {
        let sum = Rational.zero
        let size = 0
        for (let k = 0; k < 7; k++) {
          sum = sum.plus(exact(a, i, k).times(exact(b, k, j)))
          size += Math.abs(a.high[i * 7 + k]! * b.high[k * 3 + j]!)
        }
        expectNear(exact(product, i, j), sum, (7 + 6) * 4 * 2 ** -106 * size)
      }
    }
  })

  it('has the identity as its neutral element and transposes and takes parts entry by entry', () => {
    const a = full(3, 3, 21)
    const same = a.multiply(DoubleDoubleMatrix.identity(3))
    expect(same.high).toEqual(a.high)
    expect(same.low).toEqual(a.low)
    expect(exact(a.transpose(), 2, 0).minus(exact(a, 0, 2)).sign).toBe(0)
    const part = a.part(1, 3, 0, 2)
    expect([part.rows, part.columns]).toEqual([2, 2])
    expect(part.toNumbers()).toEqual([[a.high[3], a.high[4]], [a.high[6], a.high[7]]])
    expect(part.low[3]).toBe(a.low[7])
  })
})
