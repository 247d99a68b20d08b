import type { SampledCurve } from '../FigureData'
import type { Rectangle } from './Rectangle'
import { placeInCurve } from './interpolateCurve'

/** A round frequency on a curve that has frequency on neither axis, with the direction of the curve there (px, unit length). */
export interface FrequencyMark {
  frequency: number
  x: number
  y: number
  dx: number
  dy: number
}

const levels = [[1], [2, 5], [3, 7], [1.5, 4, 6, 8], [1.2, 1.8, 2.5, 3.5, 4.5, 9]]

/**
 * Round frequencies along the visible part of a curve, at least `spacing` px apart: decades first, then rounder numbers before others,
 * so that a reader of the plane can tell how fast the curve is passed.
 */
export function frequencyMarks(curve: SampledCurve, xs: Float64Array, ys: Float64Array, panel: Rectangle, spacing: number, most: number): FrequencyMark[] {
  const { frequency } = curve
  const marks: FrequencyMark[] = []
  if (frequency.length < 2) return marks
  const low = Math.floor(Math.log10(frequency[0]!))
  const high = Math.ceil(Math.log10(frequency[frequency.length - 1]!))
  for (const digits of levels) {
    for (let exponent = low; exponent <= high; exponent++) {
      for (const digit of digits) {
        if (marks.length >= most) return marks
        const value = Number((digit * 10 ** exponent).toPrecision(6))
        const place = placeInCurve(curve, value)
        if (!place) continue
        const { index, t } = place
        const [x0, y0, x1, y1] = [xs[index]!, ys[index]!, xs[index + 1]!, ys[index + 1]!]
        const [x, y] = [x0 + t * (x1 - x0), y0 + t * (y1 - y0)]
        const length = Math.hypot(x1 - x0, y1 - y0)
        if (!(length > 0) || x < panel.x + 6 || y < panel.y + 6 || x > panel.x + panel.width - 6 || y > panel.y + panel.height - 6) continue
        if (marks.some(other => Math.hypot(other.x - x, other.y - y) < spacing)) continue
        marks.push({ frequency: value, x, y, dx: (x1 - x0) / length, dy: (y1 - y0) / length })
      }
    }
  }
  return marks
}
