const SPLITTER = 134217729 // 2^27 + 1

/**
 * A dense matrix of double-doubles (unevaluated sums high + low of two doubles, about 31 digits), row by row: entry (i, j) at [i * columns + j].
 * Operations return a new matrix; algorithms that work in place write to `high` and `low` themselves.
 *
 * With u = 2^-53 sums and scalings are exact to 2 u^2 (of the entry) and 10 u^2; an entry of a product errs by at most (n + 6) 4 u^2 sum_k |a_ik| |b_kj|
 * over n inner columns. Entries must stay below 2^990 in size, and products above 2^-960, as splitting and the errors of products need room.
 * Sources: T. J. Dekker, 'A floating-point technique for extending the available precision', Numerische Mathematik 18 (1971); D. E. Knuth,
 * 'The Art of Computer Programming 2' (1969), 4.2.2; Y. Hida, X. S. Li, D. H. Bailey, 'Algorithms for quad-double precision floating point
 * arithmetic' (2001).
 */
export class DoubleDoubleMatrix {
  readonly rows: number
  readonly columns: number
  readonly high: Float64Array
  readonly low: Float64Array

  /** Of zeros. */
  constructor(rows: number, columns: number) {
    this.rows = rows
    this.columns = columns
    this.high = new Float64Array(rows * columns)
    this.low = new Float64Array(rows * columns)
  }

  static zeros(rows: number, columns: number): DoubleDoubleMatrix {
    return new DoubleDoubleMatrix(rows, columns)
  }

  static identity(size: number): DoubleDoubleMatrix {
    const matrix = new DoubleDoubleMatrix(size, size)
    for (let i = 0; i < size; i++) matrix.high[i * size + i] = 1
    return matrix
  }

  /** The doubles themselves. Every row must have as many numbers as the first; `columns` is needed where there may be no row. @throws RangeError */
  static fromNumbers(rows: readonly (readonly number[])[], columns = rows[0]?.length ?? 0): DoubleDoubleMatrix {
    const matrix = new DoubleDoubleMatrix(rows.length, columns)
    rows.forEach((row, i) => {
      if (row.length !== columns) throw new RangeError(`row ${i + 1} has ${row.length} numbers, ${columns} are needed`)
      matrix.high.set(row, i * columns)
    })
    return matrix
  }

  copy(): DoubleDoubleMatrix {
    const matrix = new DoubleDoubleMatrix(this.rows, this.columns)
    matrix.high.set(this.high)
    matrix.low.set(this.low)
    return matrix
  }

  /** Rows and columns from the first index to before the second, as a matrix of its own. */
  part(fromRow: number, toRow: number, fromColumn: number, toColumn: number): DoubleDoubleMatrix {
    const matrix = new DoubleDoubleMatrix(toRow - fromRow, toColumn - fromColumn)
    for (let i = fromRow; i < toRow; i++) {
      const start = i * this.columns
      matrix.high.set(this.high.subarray(start + fromColumn, start + toColumn), (i - fromRow) * matrix.columns)
      matrix.low.set(this.low.subarray(start + fromColumn, start + toColumn), (i - fromRow) * matrix.columns)
    }
    return matrix
  }

  transpose(): DoubleDoubleMatrix {
    const matrix = new DoubleDoubleMatrix(this.columns, this.rows)
    for (let i = 0; i < this.rows; i++) {
      for (let j = 0; j < this.columns; j++) {
        matrix.high[j * this.rows + i] = this.high[i * this.columns + j]!
        matrix.low[j * this.rows + i] = this.low[i * this.columns + j]!
      }
    }
    return matrix
  }

  /** Rounded to doubles, row by row. */
  toNumbers(): number[][] {
    return Array.from({ length: this.rows }, (_, i) => Array.from(this.high.subarray(i * this.columns, (i + 1) * this.columns)))
  }

  /** @throws RangeError for another shape */
  add(other: DoubleDoubleMatrix): DoubleDoubleMatrix {
    return this.sum(other, 1)
  }

  /** @throws RangeError for another shape */
  subtract(other: DoubleDoubleMatrix): DoubleDoubleMatrix {
    return this.sum(other, -1)
  }

  private sum(other: DoubleDoubleMatrix, sign: number): DoubleDoubleMatrix {
    if (this.rows !== other.rows || this.columns !== other.columns) {
      throw new RangeError(`a matrix of ${other.rows} by ${other.columns} cannot be added to one of ${this.rows} by ${this.columns}`)
    }
    const result = new DoubleDoubleMatrix(this.rows, this.columns)
    for (let k = 0; k < result.high.length; k++) {
      const a = this.high[k]!
      const b = sign * other.high[k]!
      const al = this.low[k]!
      const bl = sign * other.low[k]!
      let s = a + b
      let v = s - a
      let e = (a - (s - v)) + (b - v)
      // the low parts by an exact sum as well: nothing is lost where the high parts cancel
      const t = al + bl
      v = t - al
      const f = (al - (t - v)) + (bl - v)
      e += t
      const h = s + e
      e = f + (e - (h - s))
      s = h + e
      result.high[k] = s
      result.low[k] = e - (s - h)
    }
    return result
  }

  /** Times the double-double high + low. */
  scale(high: number, low = 0): DoubleDoubleMatrix {
    const result = new DoubleDoubleMatrix(this.rows, this.columns)
    let t = SPLITTER * high
    const top = t - (t - high)
    const end = high - top
    for (let k = 0; k < result.high.length; k++) {
      const b = this.high[k]!
      t = SPLITTER * b
      const bTop = t - (t - b)
      const bEnd = b - bTop
      const p = high * b
      const e = ((top * bTop - p) + top * bEnd + end * bTop) + end * bEnd + (high * this.low[k]! + low * b)
      const s = p + e
      result.high[k] = s
      result.low[k] = e - (s - p)
    }
    return result
  }

  /** Times 2^exponent, exactly. */
  timesPowerOfTwo(exponent: number): DoubleDoubleMatrix {
    const result = new DoubleDoubleMatrix(this.rows, this.columns)
    const factor = 2 ** exponent
    for (let k = 0; k < result.high.length; k++) {
      result.high[k] = this.high[k]! * factor
      result.low[k] = this.low[k]! * factor
    }
    return result
  }

  /** @throws RangeError where the inner sizes differ */
  multiply(other: DoubleDoubleMatrix): DoubleDoubleMatrix {
    if (this.columns !== other.rows) {
      throw new RangeError(`a matrix of ${this.rows} by ${this.columns} cannot be multiplied by one of ${other.rows} by ${other.columns}`)
    }
    const inner = this.columns
    const columns = other.columns
    const result = new DoubleDoubleMatrix(this.rows, columns)
    const { high, low } = result
    const bHigh = other.high
    const bLow = other.low
    const tops = new Float64Array(bHigh.length)
    for (let k = 0; k < tops.length; k++) {
      const t = SPLITTER * bHigh[k]!
      tops[k] = t - (t - bHigh[k]!)
    }
    for (let i = 0; i < this.rows; i++) {
      const row = i * columns
      for (let k = 0; k < inner; k++) {
        const a = this.high[i * inner + k]!
        if (a === 0) continue
        const al = this.low[i * inner + k]!
        const split = SPLITTER * a
        const aTop = split - (split - a)
        const aEnd = a - aTop
        const start = k * columns
        for (let j = 0; j < columns; j++) {
          const b = bHigh[start + j]!
          const bTop = tops[start + j]!
          const bEnd = b - bTop
          const p = a * b
          const e = ((aTop * bTop - p) + aTop * bEnd + aEnd * bTop) + aEnd * bEnd + (a * bLow[start + j]! + al * b)
          const c = high[row + j]!
          const s = c + p
          const v = s - c
          const rest = (c - (s - v)) + (p - v) + (low[row + j]! + e)
          const sum = s + rest
          high[row + j] = sum
          low[row + j] = rest - (sum - s)
        }
      }
    }
    return result
  }
}
