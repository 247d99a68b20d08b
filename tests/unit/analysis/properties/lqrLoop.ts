import { add, lusolve, matrix, multiply, subtract, transpose, zeros, type Matrix } from 'mathjs'

/** x with a' x + x a = -q, by the linear system of its entries (Kronecker product). */
function solveLyapunov(a: number[][], q: number[][]): number[][] {
  const n = a.length
  const system = Array.from({ length: n * n }, () => new Array<number>(n * n).fill(0))
  const right: number[] = []
  for (let i = 0; i < n; i += 1) {
    for (let j = 0; j < n; j += 1) {
      const row = system[i * n + j]!
      for (let k = 0; k < n; k += 1) {
        row[k * n + j]! += a[k]![i]!
        row[i * n + k]! += a[k]![j]!
      }
      right.push(-q[i]![j]!)
    }
  }
  const x = (lusolve(matrix(system), right) as Matrix).toArray() as number[][]
  return Array.from({ length: n }, (_, i) => Array.from({ length: n }, (_, j) => x[i * n + j]![0]!))
}

/**
 * Loop gain K (sI - A)^-1 B, as coefficients, of the regulator that minimises the integral of x'Qx + u^2 for the plant with characteristic polynomial
 * `characteristic` (highest power first, monic) in controllable canonical form.
 *
 * The Riccati equation is solved by D. L. Kleinman's iteration (IEEE Trans. Automatic Control 13, 1968), started from poles all at `-start`.
 */
export function lqrLoop(characteristic: number[], weights: number[], start: number): { numerator: number[], denominator: number[] } {
  const n = characteristic.length - 1
  const lowestFirst = characteristic.slice().reverse()
  const a = Array.from({ length: n }, (_, i) => Array.from({ length: n }, (_, j) => i < n - 1 ? (j === i + 1 ? 1 : 0) : -lowestFirst[j]!))
  const b = Array.from({ length: n }, (_, i) => [i === n - 1 ? 1 : 0])
  const q = (zeros(n, n) as Matrix).toArray() as number[][]
  weights.forEach((weight, i) => {
    q[i]![i] = weight
  })
  let binomial = 1
  let gain = Array.from({ length: n }, (_, i) => {
    const wanted = binomial * start ** (n - i)
    binomial = binomial * (n - i) / (i + 1)
    return wanted - lowestFirst[i]!
  })
  for (let step = 0; step < 60; step += 1) {
    const closed = subtract(a, multiply(b, [gain])) as number[][]
    const p = solveLyapunov(closed, add(q, multiply(transpose([gain]), [gain])) as number[][])
    gain = p[n - 1]!
  }
  // in canonical form (sI - A)^-1 B is 1, s, s^2 ... over the characteristic polynomial
  return { numerator: gain.slice().reverse(), denominator: characteristic }
}
