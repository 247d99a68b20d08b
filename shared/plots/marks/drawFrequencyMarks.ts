import { frequencyMarks } from '../curves/frequencyMarks'
import type { Rectangle } from '../curves/Rectangle'
import type { SampledCurve } from '../FigureData'
import type { LabelField } from '../labels/LabelField'
import type { Pen } from '../Pen'
import { formatTick } from '../text/formatTick'
import type { PlotTheme } from '../theme'
import { drawLabel } from './drawLabel'

const tickLength = 4

/**
 * Round frequencies as small ticks across a curve in a plane, each with its number where there is room.
 */
export function drawFrequencyMarks(pen: Pen, field: LabelField, curve: SampledCurve, xs: Float64Array, ys: Float64Array, panel: Rectangle, theme: PlotTheme): void {
  const marks = frequencyMarks(curve, xs, ys, panel, theme.size.tick * 3.6, 16)
  let d = ''
  for (const { x, y, dx, dy } of marks) {
    const [nx, ny] = [-dy * tickLength, dx * tickLength]
    d += `M${tenth(x + nx)} ${tenth(y + ny)}L${tenth(x - nx)} ${tenth(y - ny)}`
  }
  pen.stroke(d, theme.ink, theme.stroke.axis)
  for (const { x, y, dx, dy, frequency } of marks) {
    const prefer = Math.atan2(-dx, -dy) * 180 / Math.PI
    drawLabel(pen, field, [{ text: formatTick(frequency), size: theme.size.tick, fill: theme.ink }], { x, y, gap: 6, reach: 12, prefer }, theme)
  }
}

/** Parts of a piece's length at which its arrow head may stand, the best first. */
const arrowPlaces = [0.42, 0.55, 0.3, 0.68, 0.2, 0.8]

/** An arrow head on a curve, in the direction of rising frequency, near the middle of its longest visible piece and clear of the marks. */
export function drawDirection(pen: Pen, pieces: readonly number[][], marks: readonly { x: number, y: number }[], theme: PlotTheme): void {
  let longest: readonly number[] | undefined
  let length = 0
  for (const piece of pieces) {
    const total = arcLength(piece)
    if (total > length) [longest, length] = [piece, total]
  }
  if (!longest || length < 40) return
  for (const part of arrowPlaces) {
    const place = placeAlong(longest, length * part)
    if (!place || marks.some(mark => Math.hypot(mark.x - place.x, mark.y - place.y) < 14)) continue
    const { x, y, ux, uy } = place
    pen.fill(`M${tenth(x + ux * 6)} ${tenth(y + uy * 6)}L${tenth(x - ux * 4 - uy * 4)} ${tenth(y - uy * 4 + ux * 4)}L${tenth(x - ux * 2)} ${tenth(y - uy * 2)}L${tenth(x - ux * 4 + uy * 4)} ${tenth(y - uy * 4 - ux * 4)}Z`, theme.ink)
    return
  }
}

/** Place and direction (unit length) at a length along a piece, px. */
function placeAlong(piece: readonly number[], length: number): { x: number, y: number, ux: number, uy: number } | null {
  let travelled = 0
  for (let i = 2; i + 1 < piece.length; i += 2) {
    const [x0, y0, x1, y1] = [piece[i - 2]!, piece[i - 1]!, piece[i]!, piece[i + 1]!]
    const step = Math.hypot(x1 - x0, y1 - y0)
    if (travelled + step >= length && step > 0) {
      const t = (length - travelled) / step
      return { x: x0 + t * (x1 - x0), y: y0 + t * (y1 - y0), ux: (x1 - x0) / step, uy: (y1 - y0) / step }
    }
    travelled += step
  }
  return null
}

function arcLength(piece: readonly number[]): number {
  let length = 0
  for (let i = 2; i + 1 < piece.length; i += 2) length += Math.hypot(piece[i]! - piece[i - 2]!, piece[i + 1]! - piece[i - 1]!)
  return length
}

function tenth(value: number): number {
  return Math.round(value * 10) / 10
}
