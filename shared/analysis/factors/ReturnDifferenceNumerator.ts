import type { FactoredLoop, FactorList } from '../FactoredLoop'

/**
 * D + N of a loop gain N / D in factored form, evaluated without expansion: near a root both products are exact to
 * rounding, however badly conditioned their coefficients are. A whole number of samples of dead time adds poles at z = 0.
 */
export class ReturnDifferenceNumerator {
  readonly degree: number
  /** Leading coefficient of D + N. */
  readonly lead: number
  private readonly loop: FactoredLoop
  private readonly polesRe: Float64Array
  private readonly polesIm: Float64Array

  constructor(loop: FactoredLoop, delaySamples: number) {
    this.loop = loop
    const n = loop.poles.re.length + delaySamples
    this.polesRe = new Float64Array(n)
    this.polesIm = new Float64Array(n)
    this.polesRe.set(loop.poles.re)
    this.polesIm.set(loop.poles.im)
    this.degree = n
    this.lead = loop.zeros.re.length === n ? 1 + loop.gain : 1
  }

  /**
   * At x + j y, lengths in units of 1 / scaling: out[0..1] = P, out[2..3] = P' (by the scaled length), out[4] = |D| + |N|,
   * all in units of 2^out[5].
   */
  evaluate(x: number, y: number, scaling: number, out: Float64Array): void {
    const d = product(this.polesRe, this.polesIm, x, y, scaling, 1, poleProduct)
    const zeros = this.loop.zeros
    // N in the units of D: one factor of the scale for each degree that N is lower
    const n = product(zeros.re, zeros.im, x, y, scaling, this.loop.gain, zeroProduct)
    n.exponent += Math.log2(scaling) * (this.polesRe.length - zeros.re.length)
    const exponent = Math.max(d.exponent + exponentOf(d), n.exponent + exponentOf(n))
    const dUnit = 2 ** Math.max(-1070, d.exponent - exponent)
    const nUnit = 2 ** Math.max(-1070, n.exponent - exponent)
    out[0] = d.re * dUnit + n.re * nUnit
    out[1] = d.im * dUnit + n.im * nUnit
    out[2] = (d.re * d.sumRe - d.im * d.sumIm) * dUnit + (n.re * n.sumRe - n.im * n.sumIm) * nUnit
    out[3] = (d.re * d.sumIm + d.im * d.sumRe) * dUnit + (n.re * n.sumIm + n.im * n.sumRe) * nUnit
    out[4] = Math.hypot(d.re, d.im) * dUnit + Math.hypot(n.re, n.im) * nUnit
    out[5] = exponent
  }

  /** Starting points for the roots of D + N: the poles, each moved a little its own way so that no two are one. */
  besidePoles(): { re: Float64Array, im: Float64Array } {
    const size = this.typicalSize()
    const re = this.polesRe.slice()
    const im = this.polesIm.slice()
    for (let k = 0; k < re.length; k++) {
      const length = 1e-3 * Math.max(Math.hypot(re[k]!, im[k]!), 1e-3 * size)
      re[k] = re[k]! + length * Math.cos(2.4 * k + 1)
      im[k] = im[k]! + length * Math.sin(2.4 * k + 1)
    }
    return { re, im }
  }

  /** Power of two about the geometric mean of the poles, those at 0 aside. */
  typicalSize(): number {
    let sum = 0
    let count = 0
    for (let k = 0; k < this.polesRe.length; k++) {
      const size = Math.hypot(this.polesRe[k] as number, this.polesIm[k] as number)
      if (size === 0) continue
      sum += Math.log2(size)
      count++
    }
    return count === 0 ? 1 : 2 ** Math.round(sum / count)
  }

  /** Coefficients of D(sigma x) / sigma^n and N(sigma x) / sigma^n added up in doubles, lowest power first: good for starting points only. */
  roughCoefficients(sigma: number): Float64Array {
    const d = expand(this.polesRe, this.polesIm, sigma)
    const n = expand(this.loop.zeros.re, this.loop.zeros.im, sigma)
    const gain = this.loop.gain * sigma ** (this.loop.zeros.re.length - this.polesRe.length)
    n.forEach((value, k) => {
      const sum = (d[k] as number) + gain * value
      // a coefficient that is only rounding must not shape the Newton polygon
      d[k] = Math.abs(sum) < 1e-13 * Math.abs(gain * value) ? 0 : sum
    })
    return d
  }

  /** |W| that the proven errors of the factors may add at root k. */
  modelError(re: Float64Array, im: Float64Array, k: number): number {
    const x = re[k] as number
    const y = im[k] as number
    const loop = this.loop
    const error = relativeError(loop.poles, x, y) + relativeError(loop.zeros, x, y)
    if (error === 0) return 0
    // near a closed-loop root |D| = |N|: both errors are of that size
    const scaling = 2 ** -Math.round(Math.log2(Math.max(Math.abs(x), Math.abs(y), 1e-290)))
    const out = new Float64Array(6)
    this.evaluate(x, y, scaling, out)
    let log = Math.log2(out[4] as number) + (out[5] as number) - Math.log2(Math.abs(this.lead))
    for (let j = 0; j < re.length; j++) {
      if (j === k) continue
      log -= Math.log2(Math.hypot(x - (re[j] as number), y - (im[j] as number)) * scaling)
    }
    const bound = error * 2 ** log / scaling
    return Number.isNaN(bound) ? Infinity : bound
  }
}

interface Product {
  re: number
  im: number
  exponent: number
  /** sum of 1 / (x - r), in units of the scaling */
  sumRe: number
  sumIm: number
}

const poleProduct: Product = { re: 0, im: 0, exponent: 0, sumRe: 0, sumIm: 0 }
const zeroProduct: Product = { re: 0, im: 0, exponent: 0, sumRe: 0, sumIm: 0 }

function product(re: Float64Array, im: Float64Array, x: number, y: number, scaling: number, gain: number, out: Product): Product {
  let p = gain
  let q = 0
  let exponent = 0
  let sumRe = 0
  let sumIm = 0
  for (let k = 0; k < re.length; k++) {
    let a = (x - (re[k] as number)) * scaling
    const b = (y - (im[k] as number)) * scaling
    if (a === 0 && b === 0) a = 2 ** -200
    const square = a * a + b * b
    sumRe += a / square
    sumIm -= b / square
    const t = p * a - q * b
    q = p * b + q * a
    p = t
    const size = Math.abs(p) + Math.abs(q)
    if (size > 1e100) {
      p *= 2 ** -300
      q *= 2 ** -300
      exponent += 300
    }
    else if (size < 1e-100) {
      p *= 2 ** 300
      q *= 2 ** 300
      exponent -= 300
    }
  }
  out.re = p
  out.im = q
  out.exponent = exponent
  out.sumRe = sumRe
  out.sumIm = sumIm
  return out
}

function exponentOf(value: Product): number {
  return Math.round(Math.log2(Math.max(Math.abs(value.re), Math.abs(value.im))))
}

function relativeError(list: FactorList, x: number, y: number): number {
  let error = 0
  for (let k = 0; k < list.re.length; k++) {
    const bound = list.correction[k] as number
    if (bound !== 0) error += bound / Math.hypot(x - (list.re[k] as number), y - (list.im[k] as number))
  }
  return error
}

function expand(re: Float64Array, im: Float64Array, sigma: number): Float64Array {
  const coefficients = new Float64Array(re.length + 1)
  coefficients[0] = 1
  let degree = 0
  for (let k = 0; k < re.length; k++) {
    const x = (re[k] as number) / sigma
    const y = (im[k] as number) / sigma
    if (y < 0) continue
    if (y === 0) {
      degree++
      for (let j = degree; j >= 0; j--) {
        coefficients[j] = (j > 0 ? coefficients[j - 1] as number : 0) - x * (j < degree ? coefficients[j] as number : 0)
      }
      continue
    }
    degree += 2
    const square = x * x + y * y
    for (let j = degree; j >= 0; j--) {
      coefficients[j] = (j > 1 ? coefficients[j - 2] as number : 0)
        - 2 * x * (j > 0 && j < degree ? coefficients[j - 1] as number : 0)
        + square * (j < degree - 1 ? coefficients[j] as number : 0)
    }
  }
  return coefficients
}
