import type { EnclosedSeries } from '#shared/numeric/series/EnclosedSeries'
import { powerOf } from '#shared/numeric/series/powerOf'
import { shiftSeries } from '#shared/numeric/series/shiftSeries'
import { SERIES_DEGREE, type LogSeries } from './LogSeries'

const N = SERIES_DEGREE
const U = 2 ** -53
/** Largest sum |t_n| of a stretch: beyond it the truncated exponential tells nothing. */
const LARGEST_SPREAD = 2.5

/**
 * The slope of |1 + L|^2 along a stretch as an enclosed series, from the series of log L.
 *
 * On y = middle + half x, with L_s the middle's value and E = L/L_s = exp(sum_{n>=1} t_n x^n):
 *   G = (|1 + L|^2 - 1)/(|L_s| max(1, |L_s|)) = 2 alpha Re(e^(j arg L_s) E) + beta |E|^2,
 *   (alpha, beta) = (1, |L_s|) for |L_s| <= 1 and (1/|L_s|, 1) above,
 * so that nothing cancels for small or large |L|. E and |E|^2 = exp(2 Re ...) by e_n = (1/n) sum k t_k e_(n-k); the same recursion on
 * |t_k| is a majorant X, with X(1) = exp(sum |t_k|), and the tail of any derivative is the majorant's derivative at 1 less its first N terms.
 * The remainder r of log L multiplies E by exp(r); its bounds enter by the product rule. The recursion errs by at most 8Nu
 * of the majorant (N steps of N + 3 roundings, each relative to the majorant), taken as 100u, and the majorant's own differences as 50u.
 *
 * `sign` -1 does the same for 1/L, whose least |1 + 1/L| is the peak of the complementary sensitivity.
 */
export class StationarySeries implements EnclosedSeries {
  readonly degree = N - 1
  readonly coefficients = new Float64Array(N)
  readonly steady = new Float64Array(3)
  readonly tail = new Float64Array(3)
  readonly tailOrder = N

  private readonly tRe = new Float64Array(N + 1)
  private readonly tIm = new Float64Array(N + 1)
  private readonly eRe = new Float64Array(N + 1)
  private readonly eIm = new Float64Array(N + 1)
  private readonly square = new Float64Array(N + 1)
  private readonly majorant = new Float64Array(N + 1)
  private readonly squareMajorant = new Float64Array(N + 1)
  private readonly sizes = new Float64Array(N + 1)
  private readonly squareSizes = new Float64Array(N + 1)
  /** Bounds of the remainder of log L on the stretch and of its derivatives, and of its real part alone. */
  private readonly rest = new Float64Array(4)
  private readonly restRe = new Float64Array(4)

  /** Sum over n >= 1 of |t_n| of the last stretch built. */
  spread = 0

  /** Builds the slope on y in [middle - half, middle + half]; false where the stretch is too long for it. */
  build(log: LogSeries, middle: number, half: number, sign: 1 | -1 = 1): boolean {
    const { tRe, tIm, sizes, squareSizes } = this
    shiftSeries(log.re, N, middle, half, tRe)
    shiftSeries(log.im, N, middle, half, tIm)
    let spread = 0
    for (let n = 1; n <= N; n++) {
      const size = Math.sqrt(tRe[n]! * tRe[n]! + tIm[n]! * tIm[n]!)
      sizes[n] = size
      squareSizes[n] = 2 * Math.abs(tRe[n]!)
      spread += size
    }
    this.spread = spread
    if (spread > LARGEST_SPREAD) return false
    if (sign < 0) {
      for (let n = 0; n <= N; n++) {
        tRe[n] = -tRe[n]!
        tIm[n] = -tIm[n]!
      }
    }
    this.expandExponentials()
    const logGain = tRe[0]!
    const alpha = logGain <= 0 ? 1 : Math.exp(-logGain)
    const beta = logGain <= 0 ? Math.exp(logGain) : 1
    const cos = 2 * alpha * Math.cos(tIm[0]!)
    const sin = 2 * alpha * Math.sin(tIm[0]!)
    const { coefficients, eRe, eIm, square } = this
    for (let n = 1; n <= N; n++) coefficients[n - 1] = n * (cos * eRe[n]! - sin * eIm[n]! + beta * square[n]!)

    const reach = Math.min(1, Math.max(Math.abs(middle - half), Math.abs(middle + half)))
    let factor = 1
    for (let k = 0; k < 4; k++) {
      const tail = log.tail[k]! * powerOf(reach, N + 1 - k)
      this.rest[k] = factor * (log.steady[k]! + tail)
      this.restRe[k] = factor * (log.steadyRe[k]! + tail)
      factor *= half
    }
    this.steady.fill(0)
    this.tail.fill(0)
    this.addBounds(this.majorant, sizes, this.rest, 2 * alpha, 1)
    this.addBounds(this.squareMajorant, squareSizes, this.restRe, beta, 2)
    return true
  }

  /** e_n, |E|^2 and the majorants of both, by the recursion of the exponential of a series. */
  private expandExponentials(): void {
    const { tRe, tIm, eRe, eIm, square, majorant, squareMajorant, sizes, squareSizes } = this
    eRe[0] = square[0] = majorant[0] = squareMajorant[0] = 1
    eIm[0] = 0
    for (let n = 1; n <= N; n++) {
      let a = 0
      let b = 0
      let s = 0
      let x = 0
      let z = 0
      for (let k = 1; k <= n; k++) {
        const re = k * tRe[k]!
        const im = k * tIm[k]!
        const fRe = eRe[n - k]!
        const fIm = eIm[n - k]!
        a += re * fRe - im * fIm
        b += re * fIm + im * fRe
        s += 2 * re * square[n - k]!
        x += k * sizes[k]! * majorant[n - k]!
        z += k * squareSizes[k]! * squareMajorant[n - k]!
      }
      eRe[n] = a / n
      eIm[n] = b / n
      square[n] = s / n
      majorant[n] = x / n
      squareMajorant[n] = z / n
    }
  }

  /** Adds factor times the bounds of the derivatives 1 to 3 of exp(series) exp(times r), series majorised by `sizes`. */
  private addBounds(majorant: Float64Array, sizes: Float64Array, rest: Float64Array, factor: number, times: number): void {
    let t0 = 0
    let t1 = 0
    let t2 = 0
    let t3 = 0
    let x1 = 0
    let x2 = 0
    let x3 = 0
    for (let n = 1; n <= N; n++) {
      const size = sizes[n]!
      const n1 = n * (n - 1)
      const n2 = n1 * (n - 2)
      t0 += size
      t1 += n * size
      t2 += n1 * size
      t3 += n2 * size
      x1 += n * majorant[n]!
      x2 += n1 * majorant[n]!
      x3 += n2 * majorant[n]!
    }
    const total0 = Math.exp(t0)
    const total1 = t1 * total0
    const total2 = (t2 + t1 * t1) * total0
    const total3 = (t3 + 3 * t1 * t2 + t1 * t1 * t1) * total0
    const { tail, steady } = this
    tail[0] = tail[0]! + factor * (Math.max(0, total1 - x1) + 50 * U * total1)
    tail[1] = tail[1]! + factor * (Math.max(0, total2 - x2) + 50 * U * total2)
    tail[2] = tail[2]! + factor * (Math.max(0, total3 - x3) + 50 * U * total3)
    const r0 = times * rest[0]!
    const r1 = times * rest[1]!
    const r2 = times * rest[2]!
    const r3 = times * rest[3]!
    const grown = Math.exp(r0)
    const d0 = r0 * grown
    const d1 = r1 * grown
    const d2 = (r2 + r1 * r1) * grown
    const d3 = (r3 + 3 * r1 * r2 + r1 * r1 * r1) * grown
    steady[0] = steady[0]! + factor * (total1 * d0 + total0 * d1 + 100 * U * total1)
    steady[1] = steady[1]! + factor * (total2 * d0 + 2 * total1 * d1 + total0 * d2 + 100 * U * total2)
    steady[2] = steady[2]! + factor * (total3 * d0 + 3 * total2 * d1 + 3 * total1 * d2 + total0 * d3 + 100 * U * total3)
  }
}
