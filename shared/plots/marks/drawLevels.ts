import type { Rectangle } from '../curves/Rectangle'
import type { Pen } from '../Pen'
import type { AxisScale } from '../scales/AxisScale'
import { formatTick } from '../text/formatTick'
import type { PlotTheme } from '../theme'

/** Horizontal hairlines of a panel at the values, each with its number at the left, and what is drawn over the panel's upper left corner. */
export function drawLevels(pen: Pen, scale: AxisScale, values: readonly number[], panel: Rectangle, title: string, theme: PlotTheme): void {
  const size = theme.size.tick
  pen.stroke(values.map(value => `M${tenth(panel.x)} ${tenth(scale.toPixel(value))}h${tenth(panel.width)}`).join(''), theme.rule, theme.stroke.hair)
  for (const value of values) pen.text(formatTick(value), panel.x - 6, scale.toPixel(value) + size * 0.36, { size, fill: theme.slate, anchor: 'end' })
  pen.text(title, panel.x, panel.y - 6, { size, fill: theme.slate })
}

/** A line of a panel at one value that matters: 0 dB, -180 deg, the criterion. */
export function drawLevel(pen: Pen, scale: AxisScale, value: number, panel: Rectangle, colour: string, width: number, dash = ''): void {
  pen.stroke(`M${tenth(panel.x)} ${tenth(scale.toPixel(value))}h${tenth(panel.width)}`, colour, width, dash ? { 'stroke-dasharray': dash } : {})
}

function tenth(value: number): number {
  return Math.round(value * 10) / 10
}
