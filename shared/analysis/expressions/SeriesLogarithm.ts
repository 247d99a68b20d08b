import { SERIES_DEGREE } from '../search/LogSeries'
import { addGeometricTail } from './addGeometricTail'

const N = SERIES_DEGREE
const U = 2 ** -53
/** Radii that the logarithm's remainder is tried on, after 1, where only its size on the box itself is taken. */
const RADII = [1, 1.5, 2, 2.5, 3, 3.5, 5, 8, 12, 20]

/** What is known of a series S(y) = sum s_n y^n on |y| <= 1 besides its first coefficients. */
export interface SeriesBounds {
  /** Its coefficients beyond degree N are at most rest / radius^n. */
  rest: number
  radius: number
  /** Absolute error of S by rounding and by the errors of the model. */
  noise: number
}

/**
 * The logarithm of a complex Taylor series, with its remainder.
 *
 * Where |S/S_0 - 1| <= f < 1 on |y| <= R, the coefficients of log(S/S_0) are at most -ln(1 - f)/R^n (Cauchy): that gives the tail, with the R
 * that makes it least. The coefficients themselves come from l_n = s_n - (1/n) sum_(k<n) k l_k s_(n-k). The noise enters log S divided by 1 - f(1), its
 * derivatives by as many further powers and the factors N^k.
 */
export class SeriesLogarithm {
  /** log S but for its constant term. */
  readonly re = new Float64Array(N + 1)
  readonly im = new Float64Array(N + 1)
  readonly tail = new Float64Array(4)
  readonly steady = new Float64Array(4)
  /** Greatest ln|S| on |y| <= 1; holds whether the logarithm exists or not. */
  greatest = Infinity
  /** noise / |S_0| */
  rounding = 0
  private readonly ratioRe = new Float64Array(N + 1)
  private readonly ratioIm = new Float64Array(N + 1)
  private readonly sizes = new Float64Array(N + 1)

  /** False where S may vanish on the box for all that can be shown. */
  take(sRe: Float64Array, sIm: Float64Array, { rest, radius, noise }: SeriesBounds): boolean {
    const { ratioRe, ratioIm, sizes, tail } = this
    tail.fill(0)
    const square = sRe[0]! * sRe[0]! + sIm[0]! * sIm[0]!
    const size = Math.sqrt(square)
    let total = rest * radius ** -(N + 1) / (1 - 1 / radius) + noise
    for (let n = 0; n <= N; n++) {
      const length = Math.sqrt(sRe[n]! * sRe[n]! + sIm[n]! * sIm[n]!)
      total += length
      sizes[n] = length / size
      ratioRe[n] = (sRe[n]! * sRe[0]! + sIm[n]! * sIm[0]!) / square
      ratioIm[n] = (sIm[n]! * sRe[0]! - sRe[n]! * sIm[0]!) / square
    }
    this.greatest = Math.log(total) + 1e-12
    this.rounding = noise / size
    let least = Infinity
    let best = 0
    let bestSize = 0
    let f1 = 1
    for (const r of RADII) {
      const part = r / radius
      if (part > 0.8) break
      let f = 0
      let power = r
      for (let n = 1; n <= N; n++, power *= r) f += sizes[n]! * power
      f += rest / size * part ** (N + 1) / (1 - part) + noise / size * (1 + r * r)
      if (r === 1) {
        f1 = f
        continue
      }
      if (!(f < 0.99)) break
      const bound = -Math.log1p(-f)
      const left = bound * r ** -(N + 1) / (1 - 1 / r)
      if (left < least) {
        least = left
        best = r
        bestSize = bound
      }
    }
    if (best === 0) return false
    addGeometricTail(tail, N, bestSize, 1 / best)
    this.divide()
    const gap = 1 / (1 - Math.min(f1, 0.99))
    let factor = (noise / size + 100 * U * f1) * gap
    for (let d = 0; d < 4; d++, factor *= gap * N) this.steady[d] = factor
    return true
  }

  private divide(): void {
    const { re, im, ratioRe, ratioIm } = this
    for (let n = 1; n <= N; n++) {
      let a = n * ratioRe[n]!
      let b = n * ratioIm[n]!
      for (let k = 1; k < n; k++) {
        const x = k * re[k]!
        const y = k * im[k]!
        a -= x * ratioRe[n - k]! - y * ratioIm[n - k]!
        b -= x * ratioIm[n - k]! + y * ratioRe[n - k]!
      }
      re[n] = a / n
      im[n] = b / n
    }
  }
}
