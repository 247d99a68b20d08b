import type { GeneralLoop, GeneralSum } from './GeneralLoop'
import type { OriginSeries } from './originSeries'

/** Degree of the series, as all of the search has it. */
export const SUM_SERIES_DEGREE = 10

const N = SUM_SERIES_DEGREE
const U = 2 ** -53
/** Least and greatest radius (in half-lengths of the box) of the disc that the coefficients left out are bounded on. */
const LEAST_WIDE = 4.5
const MOST_WIDE = 40
/** Part of the nearest far root's distance, and turn of the longest dead time (rad), that the disc reaches. */
const REACH = 0.75
const TURN = 3
/** A root farther than this many half-lengths from the centre enters by its logarithm; a nearer one as a factor of its own. */
const FAR = LEAST_WIDE / REACH
/** Radii that the logarithm's remainder is tried on, after 1, where only its size on the box itself is taken. */
const RADII = [1, 1.5, 2, 2.5, 3, 3.5, 5, 8, 12, 20]
const BIG = 2 ** 300
const HALF_PI = Math.PI / 2

interface Term {
  gain: number
  deadTime: number
  degree: number
  /** How often each polynomial stands in it. */
  powers: number[]
}

/** Value of a sum at one place of the axis and its derivatives there. */
export interface SumValue {
  logGain: number
  phase: number
  slopeRe: number
  slopeIm: number
  bendRe: number
  bendIm: number
}

/**
 * One sum of different dead times Q(s) = sum_t gain_t prod (s - r) exp(-s T_t) on the axis s = jv, with the zero of order m that it may have at s = 0
 * divided out: its value, and the Taylor series of its logarithm with a remainder.
 *
 * On a box v = c + hy the largest term is taken out as a reference; every other term over it is
 *   a_t exp(sum of far factors' series, differences of powers only) prod of near factors (zeta/h + y),
 * multiplied out to degree N, added up to S(y), and log S found by the recursion of the logarithm. Coefficients beyond N of S are at
 * most M/w^n, M the sum of the terms' majorants on |y| <= w, w at least 4.5 (Cauchy). Where |S/S_0 - 1| <= f < 1 on |y| <= R, those of log S are at
 * most -ln(1 - f)/R^n: that gives the tail. The method is that of Taylor models (K. Makino, M. Berz, 'Taylor models and other
 * validated functional inclusion methods', 2003) with majorants in place of intervals.
 *
 * Rounding: each term's coefficients err by at most (4 roots + 60) u + 2u c |T| of its majorant on |y| <= 1 (products of complex factors, 5u each;
 * recursion of the exponential, N (N + 3) u/2 below 70u), in sum over the terms and over |S_0| an absolute error of S/S_0. It enters
 * log S divided by 1 - f(1), its derivatives by as many further powers and the factors N^k.
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
  private radius = LEAST_WIDE
  /** Relative rounding of Q at the centre. */
  rounding = 0
  readonly longestDelay: number
  readonly degree: number

  private readonly terms: Term[]
  private readonly rootsRe: Float64Array[]
  private readonly rootsIm: Float64Array[]
  private readonly corrections: Float64Array[]
  private readonly farRe: Float64Array[]
  private readonly farIm: Float64Array[]
  private readonly nearRe: number[][]
  private readonly nearIm: number[][]
  private readonly wide: Float64Array
  private readonly narrow: Float64Array
  private readonly valueRe: Float64Array
  private readonly valueIm: Float64Array
  private readonly valueExponent: Float64Array
  private readonly error: Float64Array
  private readonly tRe = new Float64Array(N + 1)
  private readonly tIm = new Float64Array(N + 1)
  private readonly eRe = new Float64Array(N + 1)
  private readonly eIm = new Float64Array(N + 1)
  private readonly sRe = new Float64Array(N + 1)
  private readonly sIm = new Float64Array(N + 1)
  private readonly sizes = new Float64Array(N + 1)
  private readonly polynomialStore: Float64Array
  private readonly origin: OriginSeries | null
  private readonly originOrder: number

  constructor(loop: GeneralLoop, sum: GeneralSum, origin: OriginSeries | null) {
    this.power = sum.power
    this.origin = origin
    this.originOrder = origin?.order ?? 0
    const used = [...new Set(sum.terms.flatMap(term => term.factors.map(factor => factor.polynomial)))]
    const lists = used.map(index => loop.polynomials[index]!)
    this.rootsRe = lists.map(list => list.re)
    this.rootsIm = lists.map(list => list.im)
    this.corrections = lists.map(list => list.correction)
    this.terms = sum.terms.map((term) => {
      const powers = used.map(index => term.factors.find(factor => factor.polynomial === index)?.power ?? 0)
      return { gain: term.gain, deadTime: term.deadTime, powers, degree: powers.reduce((total, power, p) => total + power * lists[p]!.re.length, 0) }
    })
    this.longestDelay = Math.max(...this.terms.map(term => term.deadTime))
    this.degree = Math.max(...this.terms.map(term => term.degree))
    const count = used.length
    this.farRe = lists.map(() => new Float64Array(N + 1))
    this.farIm = lists.map(() => new Float64Array(N + 1))
    this.nearRe = lists.map(() => [])
    this.nearIm = lists.map(() => [])
    this.wide = new Float64Array(count)
    this.narrow = new Float64Array(count)
    this.valueRe = new Float64Array(count)
    this.valueIm = new Float64Array(count)
    this.valueExponent = new Float64Array(count)
    this.error = new Float64Array(count)
    this.polynomialStore = new Float64Array(7 * count)
  }

  /**
   * Expands log Q about c over |v - c| <= h. False where the box holds a zero of Q for all that can be shown: then only
   * `greatest` has a meaning.
   */
  expand(c: number, h: number): boolean {
    if (this.origin && c + LEAST_WIDE * h <= this.origin.reach) return this.expandNearOrigin(this.origin, c, h)
    const shown = this.expandTerms(c, h)
    if (this.originOrder > 0) this.divideOrigin(c, h)
    return shown
  }

  /** How far ln|Q| or arg Q can stray from the centre on the box expanded last. */
  spread(): number {
    let sum = this.tail[0]! + this.steady[0]!
    for (let n = 1; n <= N; n++) sum += Math.hypot(this.re[n]!, this.im[n]!)
    return sum
  }

  /** Q(0), the zero there divided out: it is real. */
  atOrigin(): { logGain: number, negative: boolean } {
    if (this.origin) {
      const first = this.origin.coefficients[0]!
      return { logGain: this.origin.logScale + Math.log(Math.abs(first)), negative: first < 0 }
    }
    const out: SumValue = { logGain: 0, phase: 0, slopeRe: 0, slopeIm: 0, bendRe: 0, bendIm: 0 }
    this.evaluateTerms(0, out)
    return { logGain: out.logGain, negative: Math.cos(out.phase) < 0 }
  }

  /** Q and its logarithmic derivatives at v; phase in (-pi, pi]. */
  evaluate(v: number, out: SumValue): void {
    if (this.origin && v <= this.origin.reach) {
      this.evaluateNearOrigin(this.origin, v, out)
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

  /** Chooses the disc of the majorants: as wide as the far roots and the dead times let it be. */
  private widen(c: number, h: number): void {
    let nearest = Infinity
    for (let p = 0; p < this.rootsRe.length; p++) {
      const re = this.rootsRe[p]!
      const im = this.rootsIm[p]!
      for (let k = 0; k < re.length; k++) {
        const x = c - im[k]!
        const a = re[k]!
        const square = x * x + a * a
        if (square < nearest && square >= FAR * FAR * h * h) nearest = square
      }
    }
    const roots = REACH * Math.sqrt(nearest) / h
    const turns = Math.max(LEAST_WIDE, TURN / (h * this.longestDelay))
    this.radius = Math.min(roots, turns, MOST_WIDE)
  }

  /** Each polynomial at jc: far factors as series, near ones listed, the product of all far ones (over h^near) at the centre. */
  private expandPolynomials(c: number, h: number): void {
    this.widen(c, h)
    const wideRadius = this.radius
    for (let p = 0; p < this.rootsRe.length; p++) {
      const re = this.rootsRe[p]!
      const im = this.rootsIm[p]!
      const corrections = this.corrections[p]!
      const sumRe = this.farRe[p]!
      const sumIm = this.farIm[p]!
      sumRe.fill(0)
      sumIm.fill(0)
      const nearRe = this.nearRe[p]!
      const nearIm = this.nearIm[p]!
      nearRe.length = nearIm.length = 0
      let valueRe = 1
      let valueIm = 0
      let exponent = 0
      let wide = 0
      let narrow = 0
      let error = 0
      for (let k = 0; k < re.length; k++) {
        // jv - r = j (v - Im r + j Re r) = j zeta
        const x = c - im[k]!
        const a = re[k]!
        const square = x * x + a * a
        const size = Math.sqrt(square)
        error += 1.3 * corrections[k]! / Math.max(size, h)
        if (size < FAR * h) {
          nearRe.push(x / h)
          nearIm.push(a / h)
          exponent += Math.log2(h)
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
        const scale = h / square
        const qRe = x * scale
        const qIm = -a * scale
        const rho = h / size
        wide -= Math.log1p(-wideRadius * rho)
        narrow -= Math.log1p(-rho)
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
      this.valueRe[p] = valueRe
      this.valueIm[p] = valueIm
      this.valueExponent[p] = exponent
      this.wide[p] = wide
      this.narrow[p] = narrow
      this.error[p] = error
    }
  }

  private expandTerms(c: number, h: number): boolean {
    this.expandPolynomials(c, h)
    const { terms, sRe, sIm } = this
    let reference = terms[0]!
    let largest = -Infinity
    for (const term of terms) {
      const size = this.logSize(term, 1)
      if (size > largest) {
        largest = size
        reference = term
      }
    }
    sRe.fill(0)
    sIm.fill(0)
    let majorant = 0
    let rest = 0
    let noise = 0
    const referenceLog = this.farLog(reference)
    for (const term of terms) {
      const turn = term.deadTime - reference.deadTime
      let far = 0
      let farWide = this.radius * h * Math.abs(turn)
      let error = 0
      for (let p = 0; p < term.powers.length; p++) {
        const difference = Math.abs(term.powers[p]! - reference.powers[p]!)
        far += difference * this.narrow[p]!
        farWide += difference * this.wide[p]!
        error += term.powers[p]! * this.error[p]!
      }
      const ratio = this.farLog(term) - referenceLog
      const near1 = this.nearLog(term, 1)
      const inner = Math.exp(ratio + near1 + far + h * Math.abs(turn))
      majorant += inner
      rest += Math.exp(ratio + this.nearLog(term, this.radius) + farWide)
      noise += inner * (U * (4 * term.degree + 60 + 2 * c * term.deadTime + Math.abs(ratio)) + error)
      if (inner > 1e-40) this.addTerm(term, reference, ratio, c, h)
    }
    return this.takeLogarithm(h, reference, referenceLog, majorant, rest, noise)
  }

  /** ln of gain times the far factors (over h^near) at the centre. */
  private farLog(term: Term): number {
    let log = Math.log(Math.abs(term.gain))
    for (let p = 0; p < term.powers.length; p++) {
      if (term.powers[p] === 0) continue
      log += term.powers[p]! * (0.5 * Math.log(this.valueRe[p]! ** 2 + this.valueIm[p]! ** 2) + this.valueExponent[p]! * Math.LN2)
    }
    return log
  }

  /** ln prod (|zeta|/h + radius) over the near factors. */
  private nearLog(term: Term, radius: number): number {
    let log = 0
    for (let p = 0; p < term.powers.length; p++) {
      if (term.powers[p] === 0) continue
      const re = this.nearRe[p]!
      const im = this.nearIm[p]!
      for (let k = 0; k < re.length; k++) log += term.powers[p]! * Math.log(Math.hypot(re[k]!, im[k]!) + radius)
    }
    return log
  }

  private logSize(term: Term, radius: number): number {
    return this.farLog(term) + this.nearLog(term, radius)
  }

  /** Adds one term over the reference's far part to S. */
  private addTerm(term: Term, reference: Term, ratio: number, c: number, h: number): void {
    const { tRe, tIm, eRe, eIm, sRe, sIm } = this
    const turn = term.deadTime - reference.deadTime
    // angle of the ratio; its magnitude is exp(ratio)
    let angle = (term.gain < 0 ? Math.PI : 0) - (reference.gain < 0 ? Math.PI : 0) + (term.degree - reference.degree) * HALF_PI - c * turn
    tRe.fill(0)
    tIm.fill(0)
    for (let p = 0; p < term.powers.length; p++) {
      const difference = term.powers[p]! - reference.powers[p]!
      if (difference === 0) continue
      angle += difference * Math.atan2(this.valueIm[p]!, this.valueRe[p]!)
      const re = this.farRe[p]!
      const im = this.farIm[p]!
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
    for (let p = 0; p < term.powers.length; p++) {
      const re = this.nearRe[p]!
      const im = this.nearIm[p]!
      for (let repeat = 0; repeat < term.powers[p]!; repeat++) {
        for (let k = 0; k < re.length; k++) {
          // times zeta/h + y
          for (let n = N; n >= 0; n--) {
            const a = eRe[n]! * re[k]! - eIm[n]! * im[k]!
            eIm[n] = eRe[n]! * im[k]! + eIm[n]! * re[k]! + (n > 0 ? eIm[n - 1]! : 0)
            eRe[n] = a + (n > 0 ? eRe[n - 1]! : 0)
          }
        }
      }
    }
    for (let n = 0; n <= N; n++) {
      sRe[n] = sRe[n]! + eRe[n]!
      sIm[n] = sIm[n]! + eIm[n]!
    }
  }

  /** From S to log S, with the reference's own series and dead time added. */
  private takeLogarithm(h: number, reference: Term, referenceLog: number, majorant: number, rest: number, noise: number): boolean {
    const { re, im, tail, steady } = this
    re.fill(0)
    im.fill(0)
    tail.fill(0)
    let referenceFar = 0
    for (let p = 0; p < reference.powers.length; p++) {
      const power = reference.powers[p]!
      if (power === 0) continue
      referenceFar += power * this.narrow[p]!
      for (let n = 1; n <= N; n++) {
        re[n] = re[n]! + power * this.farRe[p]![n]!
        im[n] = im[n]! + power * this.farIm[p]![n]!
      }
      this.addFarTail(power, this.wide[p]!)
    }
    im[1] = im[1]! - h * reference.deadTime
    const shown = this.addLogarithm(majorant, rest, noise)
    this.greatest += referenceLog + referenceFar
    const k = reference.degree + 4
    steady[0] = steady[0]! + U * (5 * k + Math.abs(referenceLog) + k * referenceFar)
    for (let n = 1; n < 4; n++) steady[n] = steady[n]! + U * (k + 60) * N ** n * referenceFar
    return shown
  }

  /** Tail of the reference's far series: their coefficients are at most `wide`/w^n. */
  private addFarTail(power: number, wide: number): void {
    addGeometricTail(this.tail, power * wide, 1 / this.radius)
  }

  /** Adds log(S/S_0) to the series; sets `greatest` to the bound of ln|S|. */
  private addLogarithm(majorant: number, rest: number, noise: number): boolean {
    const { re, im, tail, steady, sRe, sIm } = this
    const square = sRe[0]! * sRe[0]! + sIm[0]! * sIm[0]!
    const size = Math.sqrt(square)
    let total = rest * this.radius ** -(N + 1) / (1 - 1 / this.radius) + noise
    const { tRe, tIm, sizes } = this
    for (let n = 0; n <= N; n++) {
      const length = Math.sqrt(sRe[n]! * sRe[n]! + sIm[n]! * sIm[n]!)
      total += length
      sizes[n] = length / size
    }
    this.greatest = Math.log(total) + 1e-12
    this.rounding = noise / size
    for (let n = 1; n <= N; n++) {
      tRe[n] = (sRe[n]! * sRe[0]! + sIm[n]! * sIm[0]!) / square
      tIm[n] = (sIm[n]! * sRe[0]! - sRe[n]! * sIm[0]!) / square
    }
    let best = Infinity
    let bestRadius = 0
    let bestSize = 0
    let f1 = 1
    for (const radius of RADII) {
      let f = 0
      let power = radius
      for (let n = 1; n <= N; n++, power *= radius) f += sizes[n]! * power
      const ratio = radius / this.radius
      if (ratio > 0.8) break
      f += rest / size * ratio ** (N + 1) / (1 - ratio) + noise / size * (1 + radius ** 2)
      if (radius === 1) {
        f1 = f
        continue
      }
      if (!(f < 0.99)) break
      const bound = -Math.log1p(-f)
      const left = bound * radius ** -(N + 1) / (1 - 1 / radius)
      if (left < best) {
        best = left
        bestRadius = radius
        bestSize = bound
      }
    }
    if (bestRadius === 0) return false
    addGeometricTail(tail, bestSize, 1 / bestRadius)
    // l_n = s_n - (1/n) sum k l_k s_(n-k)
    const { eRe, eIm } = this
    for (let n = 1; n <= N; n++) {
      let a = n * tRe[n]!
      let b = n * tIm[n]!
      for (let k = 1; k < n; k++) {
        const lRe = k * eRe[k]!
        const lIm = k * eIm[k]!
        a -= lRe * tRe[n - k]! - lIm * tIm[n - k]!
        b -= lRe * tIm[n - k]! + lIm * tRe[n - k]!
      }
      eRe[n] = a / n
      eIm[n] = b / n
      re[n] = re[n]! + eRe[n]!
      im[n] = im[n]! + eIm[n]!
    }
    const relative = noise / size + 100 * U * f1
    const gap = 1 / (1 - Math.min(f1, 0.99))
    let factor = relative * gap
    for (let n = 0; n < 4; n++, factor *= gap * N) steady[n] = factor
    // what the majorant tells beyond S itself only matters through the rounding above
    return majorant > 0
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
    addGeometricTail(this.tail, m, Math.min(q, 0.999))
    this.greatest -= m * Math.log(Math.max(c - h, Number.MIN_VALUE))
  }

  private expandNearOrigin(origin: OriginSeries, c: number, h: number): boolean {
    const { sRe, sIm } = this
    const { coefficients, unit } = origin
    sRe.fill(0)
    sIm.fill(0)
    this.radius = Math.min(MOST_WIDE, (origin.reach - c) / h)
    // sum_k q_k (j(c + hy)/unit)^k: Horner with polynomials in y
    const a = c / unit
    const b = h / unit
    let majorant = 0
    let rest = 0
    for (let k = coefficients.length - 1; k >= 0; k--) {
      // (x + j... ) times j(a + b y)
      for (let n = N; n >= 0; n--) {
        const lowRe = n > 0 ? sRe[n - 1]! : 0
        const lowIm = n > 0 ? sIm[n - 1]! : 0
        const x = a * sRe[n]! + b * lowRe
        const y = a * sIm[n]! + b * lowIm
        sRe[n] = -y
        sIm[n] = x
      }
      sRe[0] = sRe[0]! + coefficients[k]!
      majorant = majorant * (a + b) + Math.abs(coefficients[k]!)
      rest = rest * (a + this.radius * b) + Math.abs(coefficients[k]!)
    }
    this.re.fill(0)
    this.im.fill(0)
    this.tail.fill(0)
    rest += origin.left
    const shown = this.addLogarithm(majorant, rest, U * 60 * majorant + origin.left)
    this.greatest += origin.logScale
    return shown
  }

  private evaluateNearOrigin(origin: OriginSeries, v: number, out: SumValue): void {
    const { coefficients, unit } = origin
    const x = v / unit
    let re = 0
    let im = 0
    let d1Re = 0
    let d1Im = 0
    let d2Re = 0
    let d2Im = 0
    for (let k = coefficients.length - 1; k >= 0; k--) {
      // derivatives by x of P(jx): each step multiplies by jx
      let t = -(x * d2Im + 2 * d1Im)
      d2Im = x * d2Re + 2 * d1Re
      d2Re = t
      t = -(x * d1Im + im)
      d1Im = x * d1Re + re
      d1Re = t
      t = -x * im
      im = x * re
      re = t + coefficients[k]!
    }
    finish(re, im, d1Re / unit, d1Im / unit, d2Re / unit / unit, d2Im / unit / unit, 0, out)
    out.logGain += origin.logScale
  }

  private evaluateTerms(v: number, out: SumValue): void {
    const count = this.rootsRe.length
    const values = this.polynomialValues(v)
    let greatest = -Infinity
    for (const term of this.terms) {
      const exponent = this.termExponent(term, values)
      if (exponent > greatest) greatest = exponent
    }
    let re = 0
    let im = 0
    let d1Re = 0
    let d1Im = 0
    let d2Re = 0
    let d2Im = 0
    for (const term of this.terms) {
      const exponent = this.termExponent(term, values)
      if (exponent < greatest - 1000) continue
      const scale = term.gain * 2 ** (exponent - greatest)
      const angle = -v * term.deadTime
      let a0 = scale * Math.cos(angle)
      let b0 = scale * Math.sin(angle)
      let a1 = term.deadTime * b0
      let b1 = -term.deadTime * a0
      let a2 = term.deadTime * b1
      let b2 = -term.deadTime * a1
      for (let p = 0; p < count; p++) {
        const base = 7 * p
        for (let repeat = 0; repeat < term.powers[p]!; repeat++) {
          const x0 = values[base]!
          const y0 = values[base + 1]!
          const x1 = values[base + 2]!
          const y1 = values[base + 3]!
          const x2 = values[base + 4]!
          const y2 = values[base + 5]!
          const n2 = a2 * x0 - b2 * y0 + 2 * (a1 * x1 - b1 * y1) + a0 * x2 - b0 * y2
          b2 = a2 * y0 + b2 * x0 + 2 * (a1 * y1 + b1 * x1) + a0 * y2 + b0 * x2
          a2 = n2
          const n1 = a1 * x0 - b1 * y0 + a0 * x1 - b0 * y1
          b1 = a1 * y0 + b1 * x0 + a0 * y1 + b0 * x1
          a1 = n1
          const n0 = a0 * x0 - b0 * y0
          b0 = a0 * y0 + b0 * x0
          a0 = n0
        }
      }
      re += a0
      im += b0
      d1Re += a1
      d1Im += b1
      d2Re += a2
      d2Im += b2
    }
    finish(re, im, d1Re, d1Im, d2Re, d2Im, greatest, out)
  }

  private termExponent(term: Term, values: Float64Array): number {
    let exponent = 0
    for (let p = 0; p < term.powers.length; p++) if (term.powers[p]! > 0) exponent += term.powers[p]! * values[7 * p + 6]!
    return exponent
  }

  /** For each polynomial its value and two derivatives by v at jv, over 2^exponent: seven numbers each. */
  private polynomialValues(v: number): Float64Array {
    const count = this.rootsRe.length
    const values = this.polynomialStore
    for (let p = 0; p < count; p++) {
      const rootsRe = this.rootsRe[p]!
      const rootsIm = this.rootsIm[p]!
      let x0 = 1
      let y0 = 0
      let x1 = 0
      let y1 = 0
      let x2 = 0
      let y2 = 0
      let exponent = 0
      for (let k = 0; k < rootsRe.length; k++) {
        // times jv - r, whose derivative is j
        const a = -rootsRe[k]!
        const b = v - rootsIm[k]!
        const t2 = x2 * a - y2 * b - 2 * y1
        y2 = x2 * b + y2 * a + 2 * x1
        x2 = t2
        const t1 = x1 * a - y1 * b - y0
        y1 = x1 * b + y1 * a + x0
        x1 = t1
        const t0 = x0 * a - y0 * b
        y0 = x0 * b + y0 * a
        x0 = t0
        const size = Math.abs(x0) + Math.abs(y0) + Math.abs(x1) + Math.abs(y1)
        if (size > 1e60 || size < 1e-60) {
          const shift = Math.round(Math.log2(size))
          const scale = 2 ** -shift
          x0 *= scale
          y0 *= scale
          x1 *= scale
          y1 *= scale
          x2 *= scale
          y2 *= scale
          exponent += shift
        }
      }
      const shift = Math.round(Math.log2(Math.abs(x0) + Math.abs(y0) + Math.abs(x1) + Math.abs(y1)))
      const scale = 2 ** -shift
      const base = 7 * p
      values[base] = x0 * scale
      values[base + 1] = y0 * scale
      values[base + 2] = x1 * scale
      values[base + 3] = y1 * scale
      values[base + 4] = x2 * scale
      values[base + 5] = y2 * scale
      values[base + 6] = exponent + shift
    }
    return values
  }
}

/** Adds the bounds of a series' terms beyond N and of its derivatives, coefficients at most size * ratio^n, to `tail`. */
function addGeometricTail(tail: Float64Array, size: number, ratio: number): void {
  const last = size * ratio ** (N + 1)
  for (let k = 0; k < 4; k++) {
    // sum_(n > N) n^k x^n <= x^(N+1) (N+1)^k / (1 - x e^(k/(N+1)))
    const shrink = 1 - ratio * Math.exp(k / (N + 1))
    tail[k] = tail[k]! + (shrink > 0 ? last * (N + 1) ** k / shrink : Infinity)
  }
}

function finish(re: number, im: number, d1Re: number, d1Im: number, d2Re: number, d2Im: number, exponent: number, out: SumValue): void {
  const square = re * re + im * im
  out.logGain = 0.5 * Math.log(square) + exponent * Math.LN2
  out.phase = Math.atan2(im, re)
  const slopeRe = (d1Re * re + d1Im * im) / square
  const slopeIm = (d1Im * re - d1Re * im) / square
  out.slopeRe = slopeRe
  out.slopeIm = slopeIm
  out.bendRe = (d2Re * re + d2Im * im) / square - (slopeRe * slopeRe - slopeIm * slopeIm)
  out.bendIm = (d2Im * re - d2Re * im) / square - 2 * slopeRe * slopeIm
}
