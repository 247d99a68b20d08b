import { twoProduct } from '../real/twoProduct'

/**
 * (sI - A)^-1 at one point s, by triangular factors with row exchanges in doubles; solutions are improved with residuals in double-double
 * (J. H. Wilkinson, 'Rounding Errors in Algebraic Processes', 1963), so that they are right to about double precision of A even where sI - A is
 * badly conditioned up to about 1e14.
 */
export class ComplexResolvent {
  private readonly n: number
  private readonly re: Float64Array
  private readonly im: Float64Array
  private readonly order: Int32Array

  /** A row by row. */
  constructor(private readonly a: Float64Array, private readonly sRe: number, private readonly sIm: number) {
    const n = Math.round(Math.sqrt(a.length))
    this.n = n
    this.re = a.map(value => -value)
    this.im = new Float64Array(n * n)
    for (let i = 0; i < n; i++) {
      this.re[i * n + i]! += sRe
      this.im[i * n + i] = sIm
    }
    this.order = Int32Array.from({ length: n }, (_, i) => i)
    this.factorise()
  }

  private factorise(): void {
    const { n, re, im, order } = this
    let largest = 0
    for (const value of this.a) largest = Math.max(largest, Math.abs(value))
    for (let k = 0; k < n; k++) {
      let pivot = k
      let most = -1
      for (let i = k; i < n; i++) {
        const size = Math.abs(re[i * n + k]!) + Math.abs(im[i * n + k]!)
        if (size > most) {
          most = size
          pivot = i
        }
      }
      if (pivot !== k) {
        for (let j = 0; j < n; j++) {
          [re[k * n + j], re[pivot * n + j]] = [re[pivot * n + j]!, re[k * n + j]!]
          ;[im[k * n + j], im[pivot * n + j]] = [im[pivot * n + j]!, im[k * n + j]!]
        }
        [order[k], order[pivot]] = [order[pivot]!, order[k]!]
      }
      // s may be an eigenvalue to rounding: a pivot of that size keeps the directions that matter
      if (most === 0) re[k * n + k] = 2 ** -53 * Math.max(largest, Math.abs(this.sRe), Math.abs(this.sIm), 2 ** -300)
      const pr = re[k * n + k]!
      const pi = im[k * n + k]!
      const square = pr * pr + pi * pi
      for (let i = k + 1; i < n; i++) {
        const ar = re[i * n + k]!
        const ai = im[i * n + k]!
        if (ar === 0 && ai === 0) continue
        const fr = (ar * pr + ai * pi) / square
        const fi = (ai * pr - ar * pi) / square
        re[i * n + k] = fr
        im[i * n + k] = fi
        for (let j = k + 1; j < n; j++) {
          const ur = re[k * n + j]!
          const ui = im[k * n + j]!
          re[i * n + j]! -= fr * ur - fi * ui
          im[i * n + j]! -= fr * ui + fi * ur
        }
      }
    }
  }

  /** x = (sI - A)^-1 b of a complex b, to the precision of the factors. */
  solve(bRe: Float64Array, bIm: Float64Array): { re: Float64Array, im: Float64Array } {
    const { n, re, im, order } = this
    const xr = Float64Array.from(order, i => bRe[i]!)
    const xi = Float64Array.from(order, i => bIm[i]!)
    for (let i = 0; i < n; i++) {
      for (let j = 0; j < i; j++) subtract(xr, xi, i, re[i * n + j]!, im[i * n + j]!, j)
    }
    for (let i = n - 1; i >= 0; i--) {
      for (let j = i + 1; j < n; j++) subtract(xr, xi, i, re[i * n + j]!, im[i * n + j]!, j)
      divide(xr, xi, i, re[i * n + i]!, im[i * n + i]!)
    }
    return { re: xr, im: xi }
  }

  /** y with y' (sI - A) = c', for a real c. */
  solveTransposed(c: Float64Array): { re: Float64Array, im: Float64Array } {
    const { n, re, im, order } = this
    const xr = c.slice()
    const xi = new Float64Array(n)
    for (let i = 0; i < n; i++) {
      for (let j = 0; j < i; j++) subtract(xr, xi, i, re[j * n + i]!, im[j * n + i]!, j)
      divide(xr, xi, i, re[i * n + i]!, im[i * n + i]!)
    }
    for (let i = n - 1; i >= 0; i--) {
      for (let j = i + 1; j < n; j++) subtract(xr, xi, i, re[j * n + i]!, im[j * n + i]!, j)
    }
    const out = { re: new Float64Array(n), im: new Float64Array(n) }
    for (let i = 0; i < n; i++) {
      out.re[order[i]!] = xr[i]!
      out.im[order[i]!] = xi[i]!
    }
    return out
  }

  /** x = (sI - A)^-1 b of a real b as unevaluated sums of two doubles, improved until the residual in double-double is no smaller for it. */
  solvePrecisely(b: Float64Array): PreciseVector {
    const n = this.n
    const zero = new Float64Array(n)
    const first = this.solve(b, zero)
    const x = { re: first.re, reLow: new Float64Array(n), im: first.im, imLow: new Float64Array(n) }
    let last = Infinity
    for (let round = 0; round < 6; round++) {
      const rest = this.residual(x, b)
      const step = this.solve(rest.re, rest.im)
      let size = 0
      let whole = 0
      for (let i = 0; i < n; i++) {
        size = Math.max(size, Math.abs(step.re[i]!), Math.abs(step.im[i]!))
        whole = Math.max(whole, Math.abs(x.re[i]!), Math.abs(x.im[i]!))
      }
      if (!(size < 0.25 * last)) break
      last = size
      for (let i = 0; i < n; i++) {
        add(x.re, x.reLow, i, step.re[i]!)
        add(x.im, x.imLow, i, step.im[i]!)
      }
      if (size <= 1e-28 * whole) break
    }
    return x
  }

  /** b - (sI - A) x, the sums in double-double. */
  private residual(x: PreciseVector, b: Float64Array): { re: Float64Array, im: Float64Array } {
    const { n, a, sRe, sIm } = this
    const out = { re: new Float64Array(n), im: new Float64Array(n) }
    const sum = new Float64Array(2)
    for (let i = 0; i < n; i++) {
      sum[0] = b[i]!
      sum[1] = 0
      addProduct(sum, -sRe, x.re[i]!, x.reLow[i]!)
      addProduct(sum, sIm, x.im[i]!, x.imLow[i]!)
      for (let j = 0; j < n; j++) if (a[i * n + j] !== 0) addProduct(sum, a[i * n + j]!, x.re[j]!, x.reLow[j]!)
      out.re[i] = sum[0]! + sum[1]!
      sum.fill(0)
      addProduct(sum, -sRe, x.im[i]!, x.imLow[i]!)
      addProduct(sum, -sIm, x.re[i]!, x.reLow[i]!)
      for (let j = 0; j < n; j++) if (a[i * n + j] !== 0) addProduct(sum, a[i * n + j]!, x.im[j]!, x.imLow[j]!)
      out.im[i] = sum[0]! + sum[1]!
    }
    return out
  }
}

export interface PreciseVector {
  re: Float64Array
  reLow: Float64Array
  im: Float64Array
  imLow: Float64Array
}

/** The double-double `sum` += a (b + bLow). */
export function addProduct(sum: Float64Array, a: number, b: number, bLow: number): void {
  const [product, error] = twoProduct(a, b)
  const high = sum[0]!
  const s = high + product
  const v = s - high
  const rest = (high - (s - v)) + (product - v) + (sum[1]! + error + a * bLow)
  sum[0] = s + rest
  sum[1] = rest - (sum[0] - s)
}

function add(high: Float64Array, low: Float64Array, i: number, step: number): void {
  const a = high[i]!
  const s = a + step
  const v = s - a
  const rest = (a - (s - v)) + (step - v) + low[i]!
  high[i] = s + rest
  low[i] = rest - (high[i]! - s)
}

function subtract(xr: Float64Array, xi: Float64Array, i: number, fr: number, fi: number, j: number): void {
  const br = xr[j]!
  const bi = xi[j]!
  xr[i]! -= fr * br - fi * bi
  xi[i]! -= fr * bi + fi * br
}

function divide(xr: Float64Array, xi: Float64Array, i: number, pr: number, pi: number): void {
  const square = pr * pr + pi * pi
  const r = xr[i]!
  xr[i] = (r * pr + xi[i]! * pi) / square
  xi[i] = (xi[i]! * pr - r * pi) / square
}
