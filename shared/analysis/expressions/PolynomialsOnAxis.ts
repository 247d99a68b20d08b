import type { FactorList } from '../FactoredLoop'
import { SERIES_DEGREE } from '../search/LogSeries'

const N = SERIES_DEGREE
/** Least and greatest radius (in half-lengths of the box) of the disc that the coefficients left out are bounded on. */
export const LEAST_WIDE = 4.5
export const MOST_WIDE = 40
/** Part of the nearest far root's distance, and turn of the longest dead time (rad), that the disc reaches. */
const REACH = 0.75
const TURN = 3
/** A root farther than this many half-lengths from the centre enters by its logarithm; a nearer one as a factor of its own. */
const FAR = LEAST_WIDE / REACH
const BIG = 2 ** 300

/**
 * Polynomials given by their roots on the axis s = jv, each split at a box v = c + hy into far factors, by the Taylor series of their logarithm, and near ones,
 * zeta/h + y with zeta = (c - Im r) + j Re r; jv - r = j h (zeta/h + y). Products carry an exponent of their own, so that no order leaves the range of doubles.
 */
export class PolynomialsOnAxis {
  readonly count: number
  /** Per polynomial: the series of the logarithm of its far factors, n >= 1. */
  readonly farRe: Float64Array[]
  readonly farIm: Float64Array[]
  /** zeta/h of the near factors. */
  readonly nearRe: number[][]
  readonly nearIm: number[][]
  /** ln of the size and angle of the far factors at the centre, times h^(number of near ones). */
  readonly log: Float64Array
  readonly angle: Float64Array
  /** Majorants: of the far factors' logarithm on |y| <= 1 and <= radius, of ln |near factors| on the same. */
  readonly narrow: Float64Array
  readonly wide: Float64Array
  readonly nearNarrow: Float64Array
  readonly nearWide: Float64Array
  /** Relative error of the polynomial that the errors of its roots allow. */
  readonly error: Float64Array
  /** Radius of the wide disc of the last expansion. */
  radius = LEAST_WIDE

  /** Of `evaluate`: value over 2^exponent, P'/P and the derivative of that by v. */
  readonly valueRe: Float64Array
  readonly valueIm: Float64Array
  readonly exponent: Float64Array
  readonly slopeRe: Float64Array
  readonly slopeIm: Float64Array
  readonly bendRe: Float64Array
  readonly bendIm: Float64Array

  constructor(private readonly lists: FactorList[]) {
    const count = lists.length
    const numbers = () => new Float64Array(count)
    this.count = count
    this.farRe = lists.map(() => new Float64Array(N + 1))
    this.farIm = lists.map(() => new Float64Array(N + 1))
    this.nearRe = lists.map(() => [])
    this.nearIm = lists.map(() => [])
    this.log = numbers()
    this.angle = numbers()
    this.narrow = numbers()
    this.wide = numbers()
    this.nearNarrow = numbers()
    this.nearWide = numbers()
    this.error = numbers()
    this.valueRe = numbers()
    this.valueIm = numbers()
    this.exponent = numbers()
    this.slopeRe = numbers()
    this.slopeIm = numbers()
    this.bendRe = numbers()
    this.bendIm = numbers()
  }

  /** Expands all of them about jc over |v - c| <= h; the disc is as wide as the far roots and the longest dead time let it be. */
  expand(c: number, h: number, longestDelay: number): void {
    const nearest = this.nearestFar(c, h)
    this.radius = Math.min(REACH * nearest / h, Math.max(LEAST_WIDE, TURN / (h * longestDelay)), MOST_WIDE)
    for (let p = 0; p < this.count; p++) this.expandOne(p, c, h)
  }

  private nearestFar(c: number, h: number): number {
    let nearest = Infinity
    const limit = FAR * FAR * h * h
    for (const { re, im } of this.lists) {
      for (let k = 0; k < re.length; k++) {
        const x = c - im[k]!
        const a = re[k]!
        const square = x * x + a * a
        if (square < nearest && square >= limit) nearest = square
      }
    }
    return Math.sqrt(nearest)
  }

  private expandOne(p: number, c: number, h: number): void {
    const { re, im, correction } = this.lists[p]!
    const sumRe = this.farRe[p]!
    const sumIm = this.farIm[p]!
    const nearRe = this.nearRe[p]!
    const nearIm = this.nearIm[p]!
    sumRe.fill(0)
    sumIm.fill(0)
    nearRe.length = nearIm.length = 0
    let valueRe = 1
    let valueIm = 0
    let exponent = 0
    let wide = 0
    let narrow = 0
    let nearNarrow = 0
    let nearWide = 0
    let error = 0
    for (let k = 0; k < re.length; k++) {
      const x = c - im[k]!
      const a = re[k]!
      const square = x * x + a * a
      const size = Math.sqrt(square)
      error += 1.3 * correction[k]! / Math.max(size, h)
      const rho = h / size
      if (square < FAR * FAR * h * h) {
        nearRe.push(x / h)
        nearIm.push(a / h)
        nearNarrow += Math.log(size / h + 1)
        nearWide += Math.log(size / h + this.radius)
        continue
      }
      const t = valueRe * x - valueIm * a
      valueIm = valueRe * a + valueIm * x
      valueRe = t
      const magnitude = Math.abs(valueRe) + Math.abs(valueIm)
      if (magnitude > BIG || magnitude < 1 / BIG) {
        const shift = Math.round(Math.log2(magnitude))
        valueRe *= 2 ** -shift
        valueIm *= 2 ** -shift
        exponent += shift
      }
      wide -= Math.log1p(-this.radius * rho)
      narrow -= Math.log1p(-rho)
      const qRe = x * h / square
      const qIm = -a * h / square
      let pRe = qRe
      let pIm = qIm
      sumRe[1] = sumRe[1]! + pRe
      sumIm[1] = sumIm[1]! + pIm
      for (let n = 2; n <= N; n++) {
        const next = -(pRe * qRe - pIm * qIm)
        pIm = -(pRe * qIm + pIm * qRe)
        pRe = next
        sumRe[n] = sumRe[n]! + pRe / n
        sumIm[n] = sumIm[n]! + pIm / n
      }
    }
    this.log[p] = 0.5 * Math.log(valueRe * valueRe + valueIm * valueIm) + exponent * Math.LN2 + nearRe.length * Math.log(h)
    this.angle[p] = Math.atan2(valueIm, valueRe)
    this.wide[p] = wide
    this.narrow[p] = narrow
    this.nearNarrow[p] = nearNarrow
    this.nearWide[p] = nearWide
    this.error[p] = error
  }

  /** Values and derivatives at jv; false where one of them is zero there. */
  evaluate(v: number): boolean {
    for (let p = 0; p < this.count; p++) {
      const { re, im } = this.lists[p]!
      let valueRe = 1
      let valueIm = 0
      let exponent = 0
      let slopeRe = 0
      let slopeIm = 0
      let bendRe = 0
      let bendIm = 0
      for (let k = 0; k < re.length; k++) {
        const a = -re[k]!
        const b = v - im[k]!
        const square = a * a + b * b
        if (square === 0) return false
        const t = valueRe * a - valueIm * b
        valueIm = valueRe * b + valueIm * a
        valueRe = t
        const size = Math.abs(valueRe) + Math.abs(valueIm)
        if (size > BIG || size < 1 / BIG) {
          const shift = Math.round(Math.log2(size))
          valueRe *= 2 ** -shift
          valueIm *= 2 ** -shift
          exponent += shift
        }
        // j/(a + jb)
        const x = b / square
        const y = a / square
        slopeRe += x
        slopeIm += y
        bendRe -= x * x - y * y
        bendIm -= 2 * x * y
      }
      const shift = Math.round(Math.log2(Math.abs(valueRe) + Math.abs(valueIm)))
      this.valueRe[p] = valueRe * 2 ** -shift
      this.valueIm[p] = valueIm * 2 ** -shift
      this.exponent[p] = exponent + shift
      this.slopeRe[p] = slopeRe
      this.slopeIm[p] = slopeIm
      this.bendRe[p] = bendRe
      this.bendIm[p] = bendIm
    }
    return true
  }
}
