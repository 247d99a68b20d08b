import type { LabelField, LabelRequest, PlacedLabel } from '../labels/LabelField'
import { nearestPoint } from '../labels/LabelField'
import type { Pen } from '../Pen'
import type { FontFace } from '../text/notoSansWidths'
import { textWidth } from '../text/textWidth'
import type { PlotTheme } from '../theme'

export interface LabelLine {
  text: string
  size: number
  fill: string
  face?: FontFace
}

const leading = 1.22

/**
 * Writes a label of one or more lines near its mark where nothing is covered, with a thin line to the mark where it had to move away.
 * Returns its place, or null where there was no room and it need not be shown.
 */
export function drawLabel(pen: Pen, field: LabelField, lines: LabelLine[], request: Omit<LabelRequest, 'width' | 'height'>, theme: PlotTheme, must = false): PlacedLabel | null {
  const width = Math.max(...lines.map(({ text, size, face }) => textWidth(text, size, face)))
  const height = lines.reduce((sum, { size }) => sum + size * leading, 0)
  const placed = field.place({ ...request, width, height }, must)
  if (!placed) return null
  if (placed.needsLeader) {
    const [x, y] = nearestPoint({ x: placed.x - 2, y: placed.y, width: placed.width + 4, height: placed.height }, request.x, request.y)
    const length = Math.hypot(x - request.x, y - request.y)
    const start = Math.min(5, length) / (length || 1)
    const from = [request.x + (x - request.x) * start, request.y + (y - request.y) * start] as const
    pen.stroke(`M${tenth(from[0])} ${tenth(from[1])}L${tenth(x)} ${tenth(y)}`, lines[0]!.fill, 0.7)
    field.blockPolylines([[...from, x, y]])
  }
  // A label left of its mark ends at it.
  const onLeft = placed.x + placed.width / 2 < request.x - placed.width * 0.3
  let baseline = placed.y
  for (const { text, size, fill, face } of lines) {
    baseline += size * leading
    pen.text(text, onLeft ? placed.x + placed.width : placed.x, baseline - size * 0.27, { size, fill, face, anchor: onLeft ? 'end' : 'start' })
  }
  return placed
}

function tenth(value: number): number {
  return Math.round(value * 10) / 10
}
