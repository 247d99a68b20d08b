import { SERIES_DEGREE } from '../search/LogSeries'
import type { OriginSeries } from './originSeries'
import { MOST_WIDE } from './PolynomialsOnAxis'
import type { SeriesLogarithm } from './SeriesLogarithm'
import { setSumValue, type SumValue } from './SumValue'

const N = SERIES_DEGREE
const U = 2 ** -53

/** A sum of different dead times near s = 0 by its own Taylor series there, its zero at s = 0 divided out. */
export class OriginSeriesOnAxis {
  readonly reach: number
  readonly logScale: number
  private readonly sRe = new Float64Array(N + 1)
  private readonly sIm = new Float64Array(N + 1)

  constructor(private readonly series: OriginSeries) {
    this.reach = series.reach
    this.logScale = series.logScale
  }

  atOrigin(): { logGain: number, negative: boolean } {
    const first = this.series.coefficients[0]!
    return { logGain: this.logScale + Math.log(Math.abs(first)), negative: first < 0 }
  }

  /** Takes the logarithm of sum_k q_k (j(c + hy)/unit)^k as a series in y; false where it may vanish on the box. */
  expand(c: number, h: number, logarithm: SeriesLogarithm): boolean {
    const { coefficients, unit, left } = this.series
    const { sRe, sIm } = this
    const radius = Math.min(MOST_WIDE, (this.reach - c) / h)
    sRe.fill(0)
    sIm.fill(0)
    const a = c / unit
    const b = h / unit
    let majorant = 0
    let rest = 0
    for (let k = coefficients.length - 1; k >= 0; k--) {
      // Horner's rule with polynomials in y: times j(a + by)
      for (let n = N; n >= 0; n--) {
        const x = a * sRe[n]! + (n > 0 ? b * sRe[n - 1]! : 0)
        const y = a * sIm[n]! + (n > 0 ? b * sIm[n - 1]! : 0)
        sRe[n] = -y
        sIm[n] = x
      }
      sRe[0] = sRe[0]! + coefficients[k]!
      majorant = majorant * (a + b) + Math.abs(coefficients[k]!)
      rest = rest * (a + radius * b) + Math.abs(coefficients[k]!)
    }
    return logarithm.take(sRe, sIm, { rest: rest + left, radius, noise: U * 60 * majorant + left })
  }

  evaluate(v: number, out: SumValue): void {
    const { coefficients, unit } = this.series
    const x = v / unit
    let re = 0
    let im = 0
    let d1Re = 0
    let d1Im = 0
    let d2Re = 0
    let d2Im = 0
    for (let k = coefficients.length - 1; k >= 0; k--) {
      // P(jx) and its derivatives by x: each step multiplies by jx
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
    setSumValue(out, re, im, d1Re / unit, d1Im / unit, d2Re / unit / unit, d2Im / unit / unit, this.logScale)
  }
}
