import type { AxisLoop } from './AxisLoop'
import { AXIS_VALUE_SIZE, evaluateAxisLoop } from './evaluateAxisLoop'

/** Degree of all series of the search. */
export const SERIES_DEGREE = 10

const N = SERIES_DEGREE
const U = 2 ** -53
/** Roots nearer to the origin than this part of the centre are taken by their difference from the origin. */
const INNER = 0.1
/** Below these |q| that many terms leave less than 1e-18 of a term, which goes into the steady bound. */
const FEW = [
  { below: 1e-6, terms: 3 },
  { below: 1e-3, terms: 6 },
  { below: 1e-2, terms: 9 },
]

/**
 * The complex Taylor series of log L about a point of the axis, with its remainder:
 *
 *   log L(j(c + hy)) = sum_{n <= N} (re_n + j im_n) y^n + r(y),   |y| <= 1
 *   |r^(k)(y)| <= steady[k] + tail[k] |y|^(N + 1 - k),            k = 0..3
 *
 * With zeta_k = (c - Im r_k) + j Re r_k and q_k = h/zeta_k a factor adds weight (-1)^(n-1) q_k^n / n to term n; c - Im r_k is a
 * difference of doubles, so nothing cancels however light the damping. The tail is the sum of the terms left out, with rho = |q|:
 *   tail0 = sum w rho^(N+1)/((N+1)(1-rho)),  tail1 = sum w rho^(N+1)/(1-rho),  tail2, tail3 its derivatives at y = 1.
 *
 * Rounding, u = 2^-53, K factors, P = sum |w| rho/(1-rho), rho <= 1/2: q is right to 8u (two differences, a complex
 * reciprocal), q^n to 11nu, the sum over the factors adds K + 2, so that the value errs by u(K+13)P, and with sum n rho^n <= 2 rho/(1-rho)
 * and its like for the derivatives by u(K+24)P, u(K+46)P, u(2K+140)P. The constant term errs by 5u(K+2) + 2u|ln|L|| and the dead
 * time's 3uvτ, or 13uν; whole turns taken off the phase 2u(K+2). Working on the series later (Taylor shift) errs by (4N+4)u sum |term_n|; it is added here once.
 * Errors of the model (the corrections W of the factors): e(y) = sum W/zeta/(1 + qy) in the worst case, so |log(1 + e)| adds 2 sum W/|zeta|, and
 * its derivatives 4, 8, 24 times sum W rho/|zeta| (geometric series at rho <= 1/2). In z it is W (1 - s)/(s - r) = W ((1 - r)/(s - r) - 1):
 * |1 - s| times as much, |1 - r| times in the derivatives.
 */
export class LogSeries {
  readonly re = new Float64Array(N + 1)
  readonly im = new Float64Array(N + 1)
  readonly tail = new Float64Array(4)
  readonly steady = new Float64Array(4)
  /** The same for the real part alone, which a dead time does not touch. */
  readonly steadyRe = new Float64Array(4)
  centre = 0
  half = 1
  /** Sum over n >= 1 of |re_n| and |im_n|: how far ln|L| and the phase can stray from the centre, tails included. */
  spreadRe = 0
  spreadIm = 0

  /** Tails 0 to 3 and P of the factors taken by their difference. */
  private readonly sums = new Float64Array(5)
  private readonly weighted = new Float64Array(8)
  private readonly value = new Float64Array(AXIS_VALUE_SIZE)

  /** Expands about jc over |v - c| <= h; every root must be at least 2h from jc. */
  expand(axis: AxisLoop, c: number, h: number): void {
    evaluateAxisLoop(axis, c, this.value)
    this.expandAbout(axis, c, h, Number.NaN)
  }

  /**
   * The same with the undamped factors at j `without` left out, so that c may be their very place; the constant term is
   * then that of the last evaluation and means nothing.
   */
  expandAbout(axis: AxisLoop, c: number, h: number, without: number): void {
    const { re, im, tail } = this
    this.centre = c
    this.half = h
    re.fill(0)
    im.fill(0)
    const sampled = axis.sampleTime !== undefined
    const model = sampled && axis.hasCorrection ? Math.hypot(1, c + h) : 1
    const sums = this.sums
    sums.fill(0)
    let absolute = 0
    let small = 0
    let error = 0
    let bend = 0
    let g0 = 0
    let g2 = 0
    let g3 = 0
    let originWeight = axis.originWeight
    const { partner } = axis
    const inner = INNER * c
    for (let k = 0; k <= axis.count; k++) {
      const origin = k === axis.count
      if (origin && originWeight === 0) break
      const b = origin ? 0 : axis.im[k]!
      const x = c - b
      const a = origin ? 0 : axis.re[k]!
      if (x === 0 && a === 0 && c === without) continue
      const weight = origin ? originWeight : axis.weight[k]!
      const scale = h / (x * x + a * a)
      const qRe = x * scale
      const qIm = -a * scale
      const rho2 = qRe * qRe + qIm * qIm
      const rho = Math.sqrt(rho2)
      if (axis.hasCorrection && !origin) {
        const shift = axis.correction[k]!
        error += shift * rho / h * model
        bend += shift * (sampled ? 1 + Math.abs(a) + Math.abs(b) : 1) * rho2 / h
      }
      if (!origin && partner[k]! >= 0) {
        const other = partner[k]!
        if (other < k) continue
        // A pole and a zero close together, by their difference: q - q' = q q' ((b - b') + j(a' - a))/h.
        const y = c - axis.im[other]!
        const a2 = axis.re[other]!
        const scale2 = h / (y * y + a2 * a2)
        const baseRe = y * scale2
        const baseIm = -a2 * scale2
        const gapRe = (b - axis.im[other]!) / h
        const gapIm = (a2 - a) / h
        const productRe = qRe * baseRe - qIm * baseIm
        const productIm = qRe * baseIm + qIm * baseRe
        this.addDifference(weight, qRe, qIm, baseRe, baseIm, productRe * gapRe - productIm * gapIm, productRe * gapIm + productIm * gapRe)
        continue
      }
      if (!origin && Math.abs(b) + Math.abs(a) < inner) {
        // A root near the origin, as seen from here: it counts as one at the origin, and adds its difference from that.
        // Those of a sampled dead time cancel there.
        if (k < axis.delayStart) originWeight += weight
        const base = h / c
        this.addDifference(weight, qRe, qIm, base, 0, (qRe * b + qIm * a) / c, (qIm * b - qRe * a) / c)
        continue
      }
      let terms = N
      if (rho < 1e-2) terms = rho < FEW[0]!.below ? 3 : rho < FEW[1]!.below ? 6 : 9
      let pRe = weight * qRe
      let pIm = weight * qIm
      re[1] = re[1]! + pRe
      im[1] = im[1]! + pIm
      for (let n = 2; n <= terms; n++) {
        const t = -(pRe * qRe - pIm * qIm)
        pIm = -(pRe * qIm + pIm * qRe)
        pRe = t
        re[n] = re[n]! + pRe
        im[n] = im[n]! + pIm
      }
      const size = Math.abs(weight)
      const geometric = 1 / (1 - rho)
      absolute += size * rho * geometric
      if (terms === N) {
        const rho4 = rho2 * rho2
        // size rho^(N+1)/(1 - rho), N = 10
        const g = size * rho4 * rho4 * rho2 * rho * geometric
        g0 += g
        g2 += g * (N + rho * geometric)
        g3 += g * (N * (N - 1) + 2 * N * rho * geometric + 2 * rho2 * geometric * geometric)
      }
      else {
        small += size * rho ** (terms + 1) * geometric
      }
    }
    tail[0] = g0 / (N + 1) + sums[0]!
    tail[1] = g0 + sums[1]!
    tail[2] = g2 + sums[2]!
    tail[3] = g3 + sums[3]!
    absolute += sums[4]!
    for (let n = 2; n <= N; n++) {
      re[n] = re[n]! / n
      im[n] = im[n]! / n
    }
    im[1] = im[1]! - h * axis.deadTime
    re[0] = this.value[0]!
    im[0] = this.value[1]!
    axis.extension?.addSeries(this, c, h)
    this.bound(axis, absolute, small, error, bend, c + h)
  }

  /**
   * Adds the terms of weight (log(1 + qy) - log(1 + by)) from the difference d = q - b, so that they are right relative to d however near q is to
   * b: D_n = q^n - b^n by D_n = q D_(n-1) + d b^(n-1), with |D_n| <= n |d| rho^(n-1). The tails are sums of that, and so are the roundings:
   * 12n u of D_n, which 64|d| in P covers up to the third derivative at rho <= 0.55 (a base at the origin may lie that near).
   */
  private addDifference(weight: number, qRe: number, qIm: number, bRe: number, bIm: number, dRe: number, dIm: number): void {
    const { re, im, sums } = this
    let eRe = weight * dRe
    let eIm = weight * dIm
    let sRe = eRe
    let sIm = eIm
    re[1] = re[1]! + eRe
    im[1] = im[1]! + eIm
    for (let n = 2; n <= N; n++) {
      const t = -(sRe * bRe - sIm * bIm)
      sIm = -(sRe * bIm + sIm * bRe)
      sRe = t
      const e = sRe - (eRe * qRe - eIm * qIm)
      eIm = sIm - (eRe * qIm + eIm * qRe)
      eRe = e
      re[n] = re[n]! + eRe
      im[n] = im[n]! + eIm
    }
    const rho2 = Math.max(qRe * qRe + qIm * qIm, bRe * bRe + bIm * bIm)
    const rho = Math.sqrt(rho2)
    const g = 1 / (1 - rho)
    const size = Math.abs(weight) * Math.sqrt(dRe * dRe + dIm * dIm)
    const rho4 = rho2 * rho2
    // size rho^N/(1 - rho), N = 10
    const last = size * rho4 * rho4 * rho2 * g
    sums[0] = sums[0]! + last
    sums[1] = sums[1]! + last * (N + 1 + rho * g)
    sums[2] = sums[2]! + last * (N * (N + 1) + 2 * (N + 1) * rho * g + 2 * rho2 * g * g)
    sums[3] = sums[3]! + last * ((N + 1) * N * (N - 1) + 3 * (N + 1) * N * rho * g + 6 * (N + 1) * rho2 * g * g + 6 * rho2 * rho * g * g * g)
    sums[4] = sums[4]! + 64 * size
  }

  /** Fills `steady` and the spreads from the sums of the factors. */
  bound(axis: AxisLoop, absolute: number, small: number, error: number, bend: number, reach: number): void {
    const { re, im, tail, steady } = this
    const k = axis.count + 2
    const sums = this.weighted
    sums.fill(0)
    for (let n = 1; n <= N; n++) {
      const sizeRe = Math.abs(re[n]!)
      const sizeIm = Math.abs(im[n]!)
      const n1 = n * (n - 1)
      const n2 = n1 * (n - 2)
      sums[0] = sums[0]! + sizeRe
      sums[1] = sums[1]! + n * sizeRe
      sums[2] = sums[2]! + n1 * sizeRe
      sums[3] = sums[3]! + n2 * sizeRe
      sums[4] = sums[4]! + sizeIm
      sums[5] = sums[5]! + n * sizeIm
      sums[6] = sums[6]! + n1 * sizeIm
      sums[7] = sums[7]! + n2 * sizeIm
    }
    const slack = (4 * N + 4) * U
    const { steadyRe } = this
    steadyRe[0] = U * ((k + 13) * absolute + 5 * k + 2 * Math.abs(re[0]!)) + small + 2.1 * error + slack * sums[0]!
    steadyRe[1] = U * ((k + 24) * absolute) + 4 * small + 4.1 * bend + slack * sums[1]!
    steadyRe[2] = U * ((k + 46) * absolute) + 40 * small + 8.2 * bend + slack * sums[2]!
    steadyRe[3] = U * ((2 * k + 140) * absolute) + 400 * small + 24.6 * bend + slack * sums[3]!
    steady[0] = steadyRe[0]! + slack * sums[4]! + U * (8 + 2 * k + 3 * reach * axis.deadTime + 13 * axis.delayInSamples)
    steady[1] = steadyRe[1]! + slack * sums[5]!
    steady[2] = steadyRe[2]! + slack * sums[6]!
    steady[3] = steadyRe[3]! + slack * sums[7]!
    if (axis.extension) {
      for (let n = 0; n < 4; n++) {
        steady[n] = steady[n]! + axis.extension.steady[n]!
        steadyRe[n] = steadyRe[n]! + axis.extension.steady[n]!
      }
    }
    this.spreadRe = sums[0]! + tail[0]! + steadyRe[0]!
    this.spreadIm = sums[4]! + tail[0]! + steady[0]!
  }
}
