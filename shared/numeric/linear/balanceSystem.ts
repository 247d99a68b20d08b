/** A, B, C as x = D x~ with D = diag(2^exponents): powers of two only, so nothing is rounded. */
export interface BalancedSystem {
  a: number[][]
  b: number[][]
  c: number[][]
  exponents: Int32Array
}

const MOST_SWEEPS = 60
const FARTHEST = 400

/**
 * Scales the states by powers of two so that the row and the column of each state in A are of about one size (its diagonal aside): rounding relative to the norm
 * of A then spares small entries. B and C go along and have no say: where they are large, slow modes would be spoiled.
 * Sources: E. E. Osborne, 'On pre-conditioning of matrices', J. ACM 7 (1960); B. N. Parlett, C. Reinsch, 'Balancing a matrix for calculation
 * of eigenvalues and eigenvectors', Numerische Mathematik 13 (1969).
 */
export function balanceSystem(a: readonly (readonly number[])[], b: readonly (readonly number[])[], c: readonly (readonly number[])[]): BalancedSystem {
  const n = a.length
  const exponents = new Int32Array(n)
  const scaled = a.map(row => row.slice())
  for (let sweep = 0, changed = true; changed && sweep < MOST_SWEEPS; sweep++) {
    changed = false
    for (let i = 0; i < n; i++) {
      let column = 0
      let row = 0
      for (let j = 0; j < n; j++) {
        if (j === i) continue
        column += Math.abs(scaled[j]![i]!)
        row += Math.abs(scaled[i]![j]!)
      }
      if (!(column > 0) || !(row > 0)) continue
      const shift = Math.round(0.5 * Math.log2(row / column))
      if (shift === 0 || Math.abs(exponents[i]! + shift) > FARTHEST) continue
      const factor = 2 ** shift
      if (column * factor + row / factor > 0.95 * (column + row)) continue
      exponents[i]! += shift
      changed = true
      for (let j = 0; j < n; j++) {
        if (j === i) continue
        scaled[j]![i]! *= factor
        scaled[i]![j]! /= factor
      }
    }
  }
  return {
    a: scaled,
    b: b.map((row, i) => row.map(value => value * 2 ** -exponents[i]!)),
    c: c.map(row => row.map((value, i) => value * 2 ** exponents[i]!)),
    exponents,
  }
}
