import { SERIES_DEGREE } from '../search/LogSeries'
import { addGeometricTail } from './addGeometricTail'
import type { GeneralLoop, GeneralSum } from './GeneralLoop'
import { OriginSeriesOnAxis } from './OriginSeriesOnAxis'
import type { OriginSeries } from './originSeries'
import { LEAST_WIDE, PolynomialsOnAxis } from './PolynomialsOnAxis'
import { SeriesLogarithm } from './SeriesLogarithm'
import { setSumValue, type SumValue } from './SumValue'

const N = SERIES_DEGREE
const U = 2 ** -53
const HALF_PI = Math.PI / 2
/** ln of the size below which a term adds nothing to the sum that its majorant does not hold. */
const NEGLIGIBLE = -92

interface Term {
  /** gain = mantissa 2^exponent */
  mantissa: number
  exponent: number
  logGain: number
  negative: boolean
  deadTime: number
  degree: number
  /** How often each polynomial stands in it. */
  powers: Int32Array
}

/**
 * One sum of different dead times Q(s) = sum_t gain_t prod (s - r) exp(-s T_t) on the axis s = jv, with the zero of order m that it may have at s = 0
 * divided out: its value, and the Taylor series of its logarithm with a remainder.
 *
 * On a box v = c + hy the largest term is taken out as a reference; every other term over it is
 *   a_t exp(sum of far factors' series, differences of powers only) prod of near factors (zeta/h + y),
 * multiplied out to degree N, and all are added up to S(y), whose logarithm is taken. Coefficients beyond N of S are at most M/w^n, M the sum
 * of the terms' majorants on |y| <= w, w at least 4.5 (Cauchy). The method is that of Taylor models (K. Makino, M. Berz, 'Taylor models and
 * other validated functional inclusion methods', 2003) with majorants in place of intervals.
 *
 * Rounding: a term's coefficients err by at most (4 roots + 60) u + 2u c T of its majorant on |y| <= 1 (products of complex factors, 5u each;
 * recursion of the exponential, N (N + 3) u/2 below 70u), in sum over the terms an absolute error of S.
 */
export class DelayedSumOnAxis {
  readonly power: number
  /** Series of log Q but for its constant. */
  readonly re = new Float64Array(N + 1)
  readonly im = new Float64Array(N + 1)
  readonly tail = new Float64Array(4)
  readonly steady = new Float64Array(4)
  /** Greatest ln|Q| on the box. */
  greatest = Infinity
  readonly longestDelay: number
  readonly degree: number
  /** Terms times polynomials: what an expansion costs grows with it. */
  readonly size: number

  private readonly terms: Term[]
  private readonly polynomials: PolynomialsOnAxis
  private readonly logarithm = new SeriesLogarithm()
  private readonly origin: OriginSeriesOnAxis | null
  private readonly originOrder: number
  private readonly tRe = new Float64Array(N + 1)
  private readonly tIm = new Float64Array(N + 1)
  private readonly eRe = new Float64Array(N + 1)
  private readonly eIm = new Float64Array(N + 1)
  private readonly sRe = new Float64Array(N + 1)
  private readonly sIm = new Float64Array(N + 1)
  private readonly farLogs: Float64Array

  constructor(loop: GeneralLoop, sum: GeneralSum, origin: OriginSeries | null) {
    this.power = sum.power
    this.origin = origin && new OriginSeriesOnAxis(origin)
    this.originOrder = origin?.order ?? 0
    const used = [...new Set(sum.terms.flatMap(term => term.factors.map(factor => factor.polynomial)))]
    const lists = used.map(index => loop.polynomials[index]!)
    this.polynomials = new PolynomialsOnAxis(lists)
    this.terms = sum.terms.map((term) => {
      const powers = Int32Array.from(used, index => term.factors.find(factor => factor.polynomial === index)?.power ?? 0)
      const exponent = Math.round(Math.log2(Math.abs(term.gain)))
      return {
        mantissa: term.gain * 2 ** -exponent,
        exponent,
        logGain: Math.log(Math.abs(term.gain)),
        negative: term.gain < 0,
        deadTime: term.deadTime,
        degree: powers.reduce((total, power, p) => total + power * lists[p]!.re.length, 0),
        powers,
      }
    })
    this.farLogs = new Float64Array(this.terms.length)
    this.longestDelay = Math.max(...this.terms.map(term => term.deadTime))
    this.degree = Math.max(...this.terms.map(term => term.degree))
    this.size = this.terms.length * (used.length + 3)
  }

  /** Relative rounding of Q at the centre of the last box. */
  get rounding(): number {
    return this.logarithm.rounding
  }

  /**
   * Expands log Q about c over |v - c| <= h. False where the box holds a zero of Q for all that can be shown: then only
   * `greatest` has a meaning.
   */
  expand(c: number, h: number): boolean {
    if (this.origin && c + LEAST_WIDE * h <= this.origin.reach) {
      const shown = this.origin.expand(c, h, this.logarithm)
      this.re.set(this.logarithm.re)
      this.im.set(this.logarithm.im)
      this.tail.set(this.logarithm.tail)
      this.steady.set(this.logarithm.steady)
      this.greatest = this.logarithm.greatest + this.origin.logScale
      return shown
    }
    const shown = this.expandTerms(c, h)
    if (this.originOrder > 0) this.divideOrigin(c, h)
    return shown
  }

  /** How far ln|Q| or arg Q can stray from the centre on the box expanded last. */
  spread(): number {
    let sum = this.tail[0]! + this.steady[0]!
    for (let n = 1; n <= N; n++) sum += Math.sqrt(this.re[n]! * this.re[n]! + this.im[n]! * this.im[n]!)
    return sum
  }

  /** Q(0), the zero there divided out: it is real. */
  atOrigin(): { logGain: number, negative: boolean } {
    if (this.origin) return this.origin.atOrigin()
    const out: SumValue = { logGain: 0, phase: 0, slopeRe: 0, slopeIm: 0, bendRe: 0, bendIm: 0 }
    this.evaluateTerms(0, out)
    return { logGain: out.logGain, negative: Math.cos(out.phase) < 0 }
  }

  /** Q and its logarithmic derivatives at v; phase in (-pi, pi] but for the zeros divided out. */
  evaluate(v: number, out: SumValue): void {
    if (this.origin && v <= this.origin.reach) {
      this.origin.evaluate(v, out)
      return
    }
    this.evaluateTerms(v, out)
    if (this.originOrder > 0) {
      // Q/(jv)^m
      const m = this.originOrder
      out.logGain -= m * Math.log(v)
      out.phase -= m * HALF_PI
      out.slopeRe -= m / v
      out.bendRe += m / v / v
    }
  }

  private expandTerms(c: number, h: number): boolean {
    const { terms, polynomials, farLogs, sRe, sIm } = this
    polynomials.expand(c, h, this.longestDelay)
    let r = 0
    let largest = -Infinity
    for (let t = 0; t < terms.length; t++) {
      const { powers, logGain } = terms[t]!
      let log = logGain
      let near = 0
      for (let p = 0; p < powers.length; p++) {
        log += powers[p]! * polynomials.log[p]!
        near += powers[p]! * polynomials.nearNarrow[p]!
      }
      farLogs[t] = log
      if (log + near > largest) {
        largest = log + near
        r = t
      }
    }
    const reference = terms[r]!
    sRe.fill(0)
    sIm.fill(0)
    let rest = 0
    let noise = 0
    for (let t = 0; t < terms.length; t++) {
      const term = terms[t]!
      const turn = Math.abs(term.deadTime - reference.deadTime)
      let inner = farLogs[t]! - farLogs[r]! + h * turn
      let outer = farLogs[t]! - farLogs[r]! + polynomials.radius * h * turn
      let error = 0
      for (let p = 0; p < polynomials.count; p++) {
        const power = term.powers[p]!
        const difference = Math.abs(power - reference.powers[p]!)
        inner += difference * polynomials.narrow[p]! + power * polynomials.nearNarrow[p]!
        outer += difference * polynomials.wide[p]! + power * polynomials.nearWide[p]!
        error += power * polynomials.error[p]!
      }
      const majorant = Math.exp(inner)
      rest += Math.exp(outer)
      noise += majorant * (U * (4 * term.degree + 60 + 2 * c * term.deadTime + Math.abs(farLogs[t]! - farLogs[r]!)) + error)
      if (inner > NEGLIGIBLE) this.addTerm(term, reference, farLogs[t]! - farLogs[r]!, c, h)
      else noise += majorant
    }
    const shown = this.logarithm.take(sRe, sIm, { rest, radius: polynomials.radius, noise })
    this.addReference(reference, farLogs[r]!, h)
    return shown
  }

  /** Adds one term over the reference's far part, `ratio` the ln of its size at the centre, to S. */
  private addTerm(term: Term, reference: Term, ratio: number, c: number, h: number): void {
    const { tRe, tIm, eRe, eIm, sRe, sIm, polynomials } = this
    const turn = term.deadTime - reference.deadTime
    let angle = (term.negative === reference.negative ? 0 : Math.PI) + (term.degree - reference.degree) * HALF_PI - c * turn
    tRe.fill(0)
    tIm.fill(0)
    for (let p = 0; p < polynomials.count; p++) {
      const difference = term.powers[p]! - reference.powers[p]!
      if (difference === 0) continue
      angle += difference * polynomials.angle[p]!
      const re = polynomials.farRe[p]!
      const im = polynomials.farIm[p]!
      for (let n = 1; n <= N; n++) {
        tRe[n] = tRe[n]! + difference * re[n]!
        tIm[n] = tIm[n]! + difference * im[n]!
      }
    }
    tIm[1] = tIm[1]! - h * turn
    const size = Math.exp(ratio)
    eRe[0] = size * Math.cos(angle)
    eIm[0] = size * Math.sin(angle)
    for (let n = 1; n <= N; n++) {
      let a = 0
      let b = 0
      for (let k = 1; k <= n; k++) {
        const re = k * tRe[k]!
        const im = k * tIm[k]!
        a += re * eRe[n - k]! - im * eIm[n - k]!
        b += re * eIm[n - k]! + im * eRe[n - k]!
      }
      eRe[n] = a / n
      eIm[n] = b / n
    }
    for (let p = 0; p < polynomials.count; p++) {
      const re = polynomials.nearRe[p]!
      const im = polynomials.nearIm[p]!
      for (let repeat = 0; repeat < term.powers[p]! && re.length > 0; repeat++) {
        for (let k = 0; k < re.length; k++) this.timesFactor(re[k]!, im[k]!)
      }
    }
    for (let n = 0; n <= N; n++) {
      sRe[n] = sRe[n]! + eRe[n]!
      sIm[n] = sIm[n]! + eIm[n]!
    }
  }

  /** E times (a + jb + y), to degree N. */
  private timesFactor(a: number, b: number): void {
    const { eRe, eIm } = this
    for (let n = N; n > 0; n--) {
      const x = eRe[n]! * a - eIm[n]! * b + eRe[n - 1]!
      eIm[n] = eRe[n]! * b + eIm[n]! * a + eIm[n - 1]!
      eRe[n] = x
    }
    const x = eRe[0]! * a - eIm[0]! * b
    eIm[0] = eRe[0]! * b + eIm[0]! * a
    eRe[0] = x
  }

  /** log Q = log S + far part and dead time of the reference. */
  private addReference(reference: Term, log: number, h: number): void {
    const { re, im, tail, steady, logarithm, polynomials } = this
    re.set(logarithm.re)
    im.set(logarithm.im)
    tail.set(logarithm.tail)
    steady.set(logarithm.steady)
    let far = 0
    for (let p = 0; p < polynomials.count; p++) {
      const power = reference.powers[p]!
      if (power === 0) continue
      far += power * polynomials.narrow[p]!
      const farRe = polynomials.farRe[p]!
      const farIm = polynomials.farIm[p]!
      for (let n = 1; n <= N; n++) {
        re[n] = re[n]! + power * farRe[n]!
        im[n] = im[n]! + power * farIm[n]!
      }
      // the coefficients of a far series are at most `wide`/radius^n
      addGeometricTail(tail, N, power * polynomials.wide[p]!, 1 / polynomials.radius)
    }
    im[1] = im[1]! - h * reference.deadTime
    this.greatest = logarithm.greatest + log + far
    const k = reference.degree + 4
    steady[0] = steady[0]! + U * (5 * k + Math.abs(log) + k * far)
    for (let d = 1; d < 4; d++) steady[d] = steady[d]! + U * (k + 60) * N ** d * far
  }

  /** log(Q/(jv)^m): the zero at the origin divided out. */
  private divideOrigin(c: number, h: number): void {
    const m = this.originOrder
    const q = h / c
    let power = -1
    for (let n = 1; n <= N; n++) {
      power *= -q
      this.re[n] = this.re[n]! - m * power / n
    }
    addGeometricTail(this.tail, N, m, Math.min(q, 0.999))
    this.greatest -= m * Math.log(Math.max(c - h, Number.MIN_VALUE))
  }

  private evaluateTerms(v: number, out: SumValue): void {
    const { terms, polynomials } = this
    // At the very root of a polynomial the next double serves: Q is continuous, its logarithmic derivatives are not.
    if (!polynomials.evaluate(v)) polynomials.evaluate(v === 0 ? 1e-100 : v * (1 + 2 ** -51))
    let greatest = -Infinity
    for (const term of terms) greatest = Math.max(greatest, this.exponentOf(term))
    let re = 0
    let im = 0
    let d1Re = 0
    let d1Im = 0
    let d2Re = 0
    let d2Im = 0
    for (const term of terms) {
      const scale = term.mantissa * 2 ** (this.exponentOf(term) - greatest)
      const angle = -v * term.deadTime
      let a = scale * Math.cos(angle)
      let b = scale * Math.sin(angle)
      let xRe = 0
      let xIm = -term.deadTime
      let yRe = 0
      let yIm = 0
      for (let p = 0; p < polynomials.count; p++) {
        const power = term.powers[p]!
        for (let repeat = 0; repeat < power; repeat++) {
          const t = a * polynomials.valueRe[p]! - b * polynomials.valueIm[p]!
          b = a * polynomials.valueIm[p]! + b * polynomials.valueRe[p]!
          a = t
        }
        xRe += power * polynomials.slopeRe[p]!
        xIm += power * polynomials.slopeIm[p]!
        yRe += power * polynomials.bendRe[p]!
        yIm += power * polynomials.bendIm[p]!
      }
      re += a
      im += b
      d1Re += a * xRe - b * xIm
      d1Im += a * xIm + b * xRe
      yRe += xRe * xRe - xIm * xIm
      yIm += 2 * xRe * xIm
      d2Re += a * yRe - b * yIm
      d2Im += a * yIm + b * yRe
    }
    setSumValue(out, re, im, d1Re, d1Im, d2Re, d2Im, greatest * Math.LN2)
  }

  /** log2 of the size of a term, to within the size of its polynomials' mantissas. */
  private exponentOf(term: Term): number {
    let exponent = term.exponent
    for (let p = 0; p < term.powers.length; p++) exponent += term.powers[p]! * this.polynomials.exponent[p]!
    return exponent
  }
}
