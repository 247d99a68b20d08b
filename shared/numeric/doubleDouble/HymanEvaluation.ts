import type { ControllerHessenberg } from './controllerHessenberg'

const SPLITTER = 134217729

/**
 * Values of the polynomials of a diagonal block of a controller-Hessenberg form (rows `from` to before `to`, nothing zero below the diagonal) in
 * double-double arithmetic, by the recursion of M. A. Hyman (1957; J. H. Wilkinson, 'The Algebraic Eigenvalue Problem', 1965, 7.11): x_n = 1, the rows
 * of sI - H from the last upwards, the first giving det(sI - H) / prod h_i(i-1).
 *
 * Each value is that of a matrix within about n 2^-102 of each entry of H, which may differ from point to point.
 */
export class HymanEvaluation {
  readonly from: number
  readonly size: number
  private readonly form: ControllerHessenberg
  /** The vector x at the last point, in units of 2^exponent. */
  private readonly xHigh: Float64Array
  private readonly xLow: Float64Array
  private readonly yHigh: Float64Array
  private readonly yLow: Float64Array
  private exponent = 0
  private readonly accumulator = new Float64Array(4)
  /** [Re, its low part, Im, its low part] of the last value of `denominator`, in units of 2^exponent. */
  private readonly value = new Float64Array(4)

  constructor(form: ControllerHessenberg, from: number, to: number) {
    this.form = form
    this.from = from
    this.size = to - from
    this.xHigh = new Float64Array(this.size)
    this.xLow = new Float64Array(this.size)
    this.yHigh = new Float64Array(this.size)
    this.yLow = new Float64Array(this.size)
  }

  /** At s = re + j im, each a double-double: out = [Re, Im, exponent] of det(sI - H) / prod h_i(i-1). */
  denominator(re: number, reLow: number, im: number, imLow: number, out: Float64Array): void {
    const { xHigh, xLow, yHigh, yLow, size, from, accumulator } = this
    const { h } = this.form
    xHigh[size - 1] = 1
    xLow[size - 1] = 0
    yHigh[size - 1] = 0
    yLow[size - 1] = 0
    this.exponent = 0
    for (let i = size - 1; i >= 0; i--) {
      const row = (from + i) * h.columns + from
      accumulator.fill(0)
      this.subtractRow(row, i)
      // s x_i
      addProduct(accumulator, 0, xHigh[i]!, xLow[i]!, re, reLow)
      addProduct(accumulator, 0, -yHigh[i]!, -yLow[i]!, im, imLow)
      addProduct(accumulator, 2, xHigh[i]!, xLow[i]!, im, imLow)
      addProduct(accumulator, 2, yHigh[i]!, yLow[i]!, re, reLow)
      if (i === 0) break
      const d = h.high[row + i - 1]!
      const dLow = h.low[row + i - 1]!
      divide(accumulator, 0, d, dLow)
      divide(accumulator, 2, d, dLow)
      xHigh[i - 1] = accumulator[0]!
      xLow[i - 1] = accumulator[1]!
      yHigh[i - 1] = accumulator[2]!
      yLow[i - 1] = accumulator[3]!
      const magnitude = Math.max(Math.abs(xHigh[i - 1]!), Math.abs(yHigh[i - 1]!))
      if (magnitude > 2 ** 300) this.rescale(i - 1, -300)
      else if (magnitude < 2 ** -300 && magnitude > 0) this.rescale(i - 1, 300)
    }
    this.value.set(accumulator)
    out[0] = accumulator[0]!
    out[1] = accumulator[2]!
    out[2] = this.exponent
  }

  /**
   * At the point of the last call of `denominator`: out = [Re, Im, exponent] of the sum of weights times x, that is of C adj(sI - H) e1 / prod h_i(i-1), plus
   * the double-double `direct` times the denominator.
   */
  numerator(weightsHigh: Float64Array, weightsLow: Float64Array, direct: number, directLow: number, out: Float64Array): void {
    const { accumulator, value } = this
    accumulator.fill(0)
    if (direct !== 0) {
      addProduct(accumulator, 0, direct, directLow, value[0]!, value[1]!)
      addProduct(accumulator, 2, direct, directLow, value[2]!, value[3]!)
    }
    for (let i = 0; i < this.size; i++) {
      if (weightsHigh[i] === 0) continue
      addProduct(accumulator, 0, weightsHigh[i]!, weightsLow[i]!, this.xHigh[i]!, this.xLow[i]!)
      addProduct(accumulator, 2, weightsHigh[i]!, weightsLow[i]!, this.yHigh[i]!, this.yLow[i]!)
    }
    out[0] = accumulator[0]!
    out[1] = accumulator[2]!
    out[2] = this.exponent
  }

  private rescale(from: number, power: number): void {
    const factor = 2 ** power
    if (power > 0) {
      for (let j = from; j < this.size; j++) if (Math.max(Math.abs(this.xHigh[j]!), Math.abs(this.yHigh[j]!)) > 2 ** 600) return
    }
    for (let j = from; j < this.size; j++) {
      this.xHigh[j]! *= factor
      this.xLow[j]! *= factor
      this.yHigh[j]! *= factor
      this.yLow[j]! *= factor
    }
    this.exponent -= power
  }

  /** accumulator -= sum over j >= i of h_ij x_j */
  private subtractRow(row: number, i: number): void {
    const { xHigh, xLow, yHigh, yLow, size, accumulator } = this
    const { high, low } = this.form.h
    let ah = accumulator[0]!
    let al = accumulator[1]!
    let bh = accumulator[2]!
    let bl = accumulator[3]!
    for (let j = i; j < size; j++) {
      const w = -high[row + j]!
      if (w === 0) continue
      const wl = -low[row + j]!
      let t = SPLITTER * w
      const wTop = t - (t - w)
      const wEnd = w - wTop
      let b = xHigh[j]!
      t = SPLITTER * b
      let bTop = t - (t - b)
      let bEnd = b - bTop
      let p = w * b
      let e = ((wTop * bTop - p) + wTop * bEnd + wEnd * bTop) + wEnd * bEnd + (w * xLow[j]! + wl * b)
      let s = ah + p
      let v = s - ah
      let rest = (ah - (s - v)) + (p - v) + (al + e)
      ah = s + rest
      al = rest - (ah - s)
      b = yHigh[j]!
      t = SPLITTER * b
      bTop = t - (t - b)
      bEnd = b - bTop
      p = w * b
      e = ((wTop * bTop - p) + wTop * bEnd + wEnd * bTop) + wEnd * bEnd + (w * yLow[j]! + wl * b)
      s = bh + p
      v = s - bh
      rest = (bh - (s - v)) + (p - v) + (bl + e)
      bh = s + rest
      bl = rest - (bh - s)
    }
    accumulator[0] = ah
    accumulator[1] = al
    accumulator[2] = bh
    accumulator[3] = bl
  }
}

/** The double-double at `at` of `target` += a b. */
function addProduct(target: Float64Array, at: number, a: number, aLow: number, b: number, bLow: number): void {
  let t = SPLITTER * a
  const aTop = t - (t - a)
  const aEnd = a - aTop
  t = SPLITTER * b
  const bTop = t - (t - b)
  const bEnd = b - bTop
  const p = a * b
  const e = ((aTop * bTop - p) + aTop * bEnd + aEnd * bTop) + aEnd * bEnd + (a * bLow + aLow * b)
  const c = target[at]!
  const s = c + p
  const v = s - c
  const rest = (c - (s - v)) + (p - v) + (target[at + 1]! + e)
  target[at] = s + rest
  target[at + 1] = rest - (target[at]! - s)
}

const quotientRest = new Float64Array(2)

/** The double-double at `at` of `target` /= d, by division with remainder in two steps. */
function divide(target: Float64Array, at: number, d: number, dLow: number): void {
  const quotient = target[at]! / d
  quotientRest[0] = target[at]!
  quotientRest[1] = target[at + 1]!
  addProduct(quotientRest, 0, -quotient, 0, d, dLow)
  const correction = quotientRest[0]! / d
  const sum = quotient + correction
  target[at] = sum
  target[at + 1] = correction - (sum - quotient)
}
