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

/** First digits of the frequencies marked, the most telling first. */
const levels = [[1], [2, 5], [3, 7], [1.5, 4, 6, 8], [1.2, 1.8, 2.5, 3.5, 4.5, 9]]

/** px; a longer visible stretch without a mark gets one of more digits. */
const longestBareStretch = 130

/**
 * Round frequencies along the visible part of a curve, at least `spacing` px apart: decades first, then rounder numbers before others, so that a reader
 * of the plane can tell how fast the curve is passed. A loop that a resonance draws within a few percent of frequency gets a mark of more digits.
 */
export function frequencyMarks(curve: SampledCurve, xs: Float64Array, ys: Float64Array, panel: Rectangle, spacing: number, most: number): FrequencyMark[] {
  const { frequency } = curve
  const marks: FrequencyMark[] = []
  if (frequency.length < 2) return marks

  const add = (value: number) => {
    if (marks.length >= most) return
    const place = placeInCurve(curve, value)
    if (!place) return
    const { index, t } = place
    const [x0, y0, x1, y1] = [xs[index]!, ys[index]!, xs[index + 1]!, ys[index + 1]!]
    const [x, y] = [x0 + t * (x1 - x0), y0 + t * (y1 - y0)]
    const length = Math.hypot(x1 - x0, y1 - y0)
    // A chord across half the panel is the seam of a wrapped phase.
    if (!(length > 0) || length > panel.width / 2 || !isInside(x, y, panel)) return
    if (marks.some(other => Math.hypot(other.x - x, other.y - y) < spacing)) return
    marks.push({ frequency: value, x, y, dx: (x1 - x0) / length, dy: (y1 - y0) / length })
  }

  const low = Math.floor(Math.log10(frequency[0]!))
  const high = Math.ceil(Math.log10(frequency[frequency.length - 1]!))
  for (const digits of levels) {
    for (let exponent = low; exponent <= high; exponent++) {
      for (const digit of digits) add(Number((digit * 10 ** exponent).toPrecision(6)))
    }
  }
  for (const [from, to] of bareStretches(curve, xs, ys, panel, marks)) add(roundestBetween(from, to))
  return marks
}

/** Stretches of frequency along which the curve is visible for long without a mark: their middle thirds. */
function bareStretches({ frequency }: SampledCurve, xs: Float64Array, ys: Float64Array, panel: Rectangle, marks: FrequencyMark[]): [number, number][] {
  const marked = marks.map(mark => mark.frequency)
  const stretches: [number, number][] = []
  let lengths: { frequency: number, length: number }[] = []
  const close = () => {
    const total = lengths.at(-1)?.length ?? 0
    if (total > longestBareStretch) {
      const at = (part: number) => lengths.find(({ length }) => length >= part * total)!.frequency
      stretches.push([at(0.3), at(0.7)])
    }
    lengths = []
  }
  for (let i = 1; i < xs.length; i++) {
    const step = Math.hypot(xs[i]! - xs[i - 1]!, ys[i]! - ys[i - 1]!)
    if (!isInside(xs[i]!, ys[i]!, panel) || !isInside(xs[i - 1]!, ys[i - 1]!, panel) || !(step >= 0)
      || marked.some(value => value > frequency[i - 1]! && value <= frequency[i]!)) {
      close()
      continue
    }
    lengths.push({ frequency: frequency[i]!, length: (lengths.at(-1)?.length ?? 0) + step })
  }
  close()
  return stretches.filter(([from, to]) => to > from)
}

/** The number with the fewest digits between two. */
function roundestBetween(from: number, to: number): number {
  const middle = Math.sqrt(from * to)
  for (let digits = 1; digits < 6; digits++) {
    const value = Number(middle.toPrecision(digits))
    if (value >= from && value <= to) return value
  }
  return Number(middle.toPrecision(6))
}

function isInside(x: number, y: number, panel: Rectangle): boolean {
  return x >= panel.x + 6 && y >= panel.y + 6 && x <= panel.x + panel.width - 6 && y <= panel.y + panel.height - 6
}
