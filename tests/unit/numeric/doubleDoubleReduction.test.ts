import { describe, expect, it } from 'vitest'
import { controllerHessenberg } from '#shared/numeric/doubleDouble/controllerHessenberg'
import { DoubleDoubleMatrix } from '#shared/numeric/doubleDouble/DoubleDoubleMatrix'
import { HymanEvaluation } from '#shared/numeric/doubleDouble/HymanEvaluation'
import { refineDoubleDoubleRoots, type PreciseValue } from '#shared/numeric/doubleDouble/refineDoubleDoubleRoots'
import { Rational } from '#shared/numeric/extended/Rational'

type Matrix = Rational[][]
const exact = (matrix: DoubleDoubleMatrix): Matrix => Array.from({ length: matrix.rows }, (_, i) => Array.from({ length: matrix.columns }, (_, j) =>
  Rational.fromDouble(matrix.high[i * matrix.columns + j]!).plus(Rational.fromDouble(matrix.low[i * matrix.columns + j]!))))
const times = (a: Matrix, b: Matrix): Matrix => a.map(row => b[0]!.map((_, j) => row.reduce((sum, value, k) => sum.plus(value.times(b[k]![j]!)), Rational.zero)))

const a = [[0.3, -1.7, 2.5, 0.1], [4.1, 0.2, -0.9, 1.3], [-0.6, 3.3, -2.2, 0.7], [1.9, -0.4, 0.8, -1.1]]
const b = [[0.7], [-1.2], [0.4], [2.1]]
const c = [[1.5, -0.3, 0.9, 0.2], [0, 1, 0, -2]]
const form = controllerHessenberg(DoubleDoubleMatrix.fromNumbers(a), DoubleDoubleMatrix.fromNumbers(b), DoubleDoubleMatrix.fromNumbers(c))

describe('the controller-Hessenberg form', () => {
  it('has zeros below its first subdiagonal, and the response of the system to 28 digits: C A^k b in exact fractions', () => {
    for (let i = 2; i < 4; i++) for (let j = 0; j < i - 1; j++) expect(form.h.high[i * 4 + j]).toBe(0)
    const beta = Rational.fromDouble(form.beta.high).plus(Rational.fromDouble(form.beta.low))
    let reduced: Matrix = [[beta], [Rational.zero], [Rational.zero], [Rational.zero]]
    let given = exact(DoubleDoubleMatrix.fromNumbers(b))
    for (let k = 0; k < 6; k++) {
      const found = times(exact(form.c), reduced)
      const wanted = times(exact(DoubleDoubleMatrix.fromNumbers(c)), given)
      for (const row of [0, 1]) expect(Math.abs(found[row]![0]!.minus(wanted[row]![0]!).toNumber())).toBeLessThan(1e-27 * 10 ** k)
      reduced = times(exact(form.h), reduced)
      given = times(exact(DoubleDoubleMatrix.fromNumbers(a)), given)
    }
  })

  it('ends its first block where the input reaches no farther', () => {
    const diagonal = DoubleDoubleMatrix.fromNumbers([[-1, 0, 0], [0, -2, 0], [0, 0, -3]])
    const starts = (column: number[]) => controllerHessenberg(diagonal, DoubleDoubleMatrix.fromNumbers(column.map(value => [value])), DoubleDoubleMatrix.fromNumbers([[1, 1, 1]])).starts
    expect(starts([1, 1, 1])).toEqual([0, 3])
    expect(starts([1, 0, 1])[1]).toBe(2)
    expect(starts([0, 0, 4])[1]).toBe(1)
    expect(controllerHessenberg(diagonal, DoubleDoubleMatrix.zeros(3, 1), DoubleDoubleMatrix.fromNumbers([[1, 1, 1]])).beta.high).toBe(0)
  })
})

describe('values of the characteristic polynomial by the rows from the last upwards', () => {
  it('are those of the determinant in exact fractions', () => {
    const h = exact(form.h)
    const evaluation = new HymanEvaluation(form, 0, 4)
    const out = new Float64Array(3)
    for (const s of [0.25, -3, 17]) {
      evaluation.denominator(s, 0, 0, 0, out)
      const matrix = h.map((row, i) => row.map((value, j) => (i === j ? Rational.fromDouble(s) : Rational.zero).minus(value)))
      const divisor = h[1]![0]!.times(h[2]![1]!).times(h[3]![2]!)
      const wanted = determinant(matrix).over(divisor).toNumber()
      expect(out[0]! * 2 ** out[2]!).toBeCloseTo(wanted, 12)
      expect(out[1]).toBe(0)
    }
  })
})

function determinant(m: Matrix): Rational {
  if (m.length === 1) return m[0]![0]!
  return m[0]!.reduce((sum, value, j) => {
    const minor = determinant(m.slice(1).map(row => row.filter((_, k) => k !== j)))
    return sum.plus((j % 2 === 0 ? value : value.negated()).times(minor))
  }, Rational.zero)
}

/** Values of a polynomial, lowest power first, in exact fractions. */
const valueOf = (coefficients: number[]): PreciseValue => (re, reLow, im, imLow, out) => {
  const x = Rational.fromDouble(re).plus(Rational.fromDouble(reLow))
  const y = Rational.fromDouble(im).plus(Rational.fromDouble(imLow))
  let p = Rational.zero
  let q = Rational.zero
  for (let k = coefficients.length - 1; k >= 0; k--) {
    const t = p.times(x).minus(q.times(y)).plus(Rational.fromDouble(coefficients[k]!))
    q = p.times(y).plus(q.times(x))
    p = t
  }
  out[0] = p.toNumber()
  out[1] = q.toNumber()
  out[2] = 0
}

function rootsOf(coefficients: number[], start: [number, number][]): { roots: [number, number][], relative: number } {
  const found = refineDoubleDoubleRoots(valueOf(coefficients), { mantissa: coefficients[coefficients.length - 1]!, exponent: 0 }, 10,
    { re: Float64Array.from(start, root => root[0]), im: Float64Array.from(start, root => root[1]) })
  return {
    roots: Array.from(found.re, (re, k): [number, number] => [re, found.im[k]!]).sort((p, q) => p[0] - q[0] || p[1] - q[1]),
    relative: Math.max(...Array.from(found.correction, (size, k) => size / Math.hypot(found.re[k]!, found.im[k]!))),
  }
}

describe('roots to double-double precision', () => {
  it('of x^3 - 2 from rough starts', () => {
    const { roots, relative } = rootsOf([-2, 0, 0, 1], [[1.2, 0], [-0.6, 1.1], [-0.6, -1.1]])
    expect(relative).toBeLessThan(1e-28)
    expect(roots[2]![0]).toBe(Math.cbrt(2))
    expect(roots[0]![1]).toBe(-roots[1]![1])
  })

  it('of a pair that the starts take for two reals, and of two reals that they take for a pair', () => {
    expect(rootsOf([1.0625, -2, 1], [[0.9, 0], [1.1, 0]]).roots).toEqual([[1, -0.25], [1, 0.25]])
    expect(rootsOf([0.9375, -2, 1], [[1, 0.1], [1, -0.1]]).roots).toEqual([[0.75, 0], [1.25, 0]])
  })

  it('of exact multiples are as near as half the digits tell', () => {
    for (const [re, im] of rootsOf([1, -2, 1], [[1 + 1e-8, 0], [1 - 1e-8, 0]]).roots) expect(Math.hypot(re - 1, im)).toBeLessThan(1e-13)
    for (const [re, im] of rootsOf([-1, 3, -3, 1], [[1 + 1e-5, 0], [1 - 1e-5, 1e-5], [1 - 1e-5, -1e-5]]).roots) expect(Math.hypot(re - 1, im)).toBeLessThan(1e-8)
    expect(rootsOf([0, 0, 1], [[0, 0], [0, 0]]).roots.every(([re, im]) => Math.hypot(re, im) < 1e-29)).toBe(true)
  })
})
