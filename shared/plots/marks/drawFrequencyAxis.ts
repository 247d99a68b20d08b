import type { FrequencyUnit } from '../../types/analysis'
import type { Rectangle } from '../curves/Rectangle'
import type { Pen } from '../Pen'
import type { AxisScale } from '../scales/AxisScale'
import { logTicks } from '../scales/logTicks'
import { formatTick } from '../text/formatTick'
import { textWidth } from '../text/textWidth'
import type { PlotTheme } from '../theme'

/** Vertical hairlines of a logarithmic frequency axis over the height of a panel. */
export function drawFrequencyGrid(pen: Pen, scale: AxisScale, panel: Rectangle, theme: PlotTheme): void {
  const d = logTicks(scale.from, scale.to, mostNumbers(panel.width, theme)).filter(tick => tick.major)
    .map(({ value }) => `M${half(scale.toPixel(value))} ${half(panel.y)}V${half(panel.y + panel.height)}`).join('')
  pen.stroke(d, theme.rule, theme.stroke.hair)
}

/** Numbers and small ticks of a frequency axis under a panel (or over it), with its title at the right end. */
export function drawFrequencyNumbers(pen: Pen, scale: AxisScale, panel: Rectangle, unit: FrequencyUnit, theme: PlotTheme, side: 'above' | 'below'): void {
  const below = side === 'below'
  const edge = below ? panel.y + panel.height : panel.y
  const sign = below ? 1 : -1
  const size = theme.size.tick
  const ticks = logTicks(scale.from, scale.to, mostNumbers(panel.width, theme))
  pen.stroke(ticks.map(({ value, major }) => `M${half(scale.toPixel(value))} ${half(edge)}v${sign * (major ? 5 : 3)}`).join(''), theme.slate, theme.stroke.hair)
  const baseline = below ? edge + 7 + size : edge - 9
  for (const { value, major } of ticks) {
    if (major) pen.text(formatTick(value), scale.toPixel(value), baseline, { size, fill: theme.slate, anchor: 'middle' })
  }
  const title = `frequency, ${unit}`
  const titleBaseline = below ? baseline + size + 4 : baseline - size - 4
  pen.text(title, panel.x + panel.width, titleBaseline, { size, fill: theme.slate, anchor: 'end' })
}

/** px that the last number of an axis reaches beyond its panel */
export function numberOverhang(theme: PlotTheme): number {
  return Math.ceil(textWidth('10000', theme.size.tick) / 2) + 1
}

/** px a panel's frequency axis needs under it (or over it) */
export function frequencyAxisHeight(theme: PlotTheme): number {
  return 2 * theme.size.tick + 14
}

function mostNumbers(width: number, theme: PlotTheme): number {
  return Math.max(2, Math.floor(width / (theme.size.tick * 3.6)))
}

function half(value: number): number {
  return Math.round(value * 10) / 10
}
