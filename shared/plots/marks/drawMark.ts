import type { FigureMark, FigureOptions } from '../Figure'
import type { Pen } from '../Pen'
import type { PlotTheme } from '../theme'
import type { ApproachStyle } from './approachStyle'
import { approachColour } from './approachStyle'

const halo = 9

/** Outline of a triangle: gain rising points up, gain falling points down; (x, y) is its middle. */
export function trianglePath(x: number, y: number, size: number, slope: 'falling' | 'rising'): string {
  const up = slope === 'rising' ? 1 : -1
  const [h, w] = [size * 0.5, size * 0.56]
  return `M${tenth(x - w)} ${tenth(y + up * h)}L${tenth(x + w)} ${tenth(y + up * h)}L${tenth(x)} ${tenth(y - up * h)}Z`
}

/** Outline of a diamond about (x, y). */
export function diamondPath(x: number, y: number, radius: number): string {
  return `M${tenth(x)} ${tenth(y - radius)}L${tenth(x + radius)} ${tenth(y)}L${tenth(x)} ${tenth(y + radius)}L${tenth(x - radius)} ${tenth(y)}Z`
}

function tenth(value: number): string {
  return String(Math.round(value * 10) / 10 + 0)
}

/**
 * The group of one mark. On the screen it can be focused and lit: it carries the mark's id and words, and a ring that the page's styles show
 * while the mark is lit.
 */
export function markGroup(pen: Pen, mark: FigureMark, options: FigureOptions): Pen {
  if (!options.interactive) return pen.group()
  const group = pen.group({ 'class': 'plot-mark', 'data-mark': mark.id, 'role': 'button', 'tabindex': -1, 'aria-label': mark.label })
  group.circle(mark.x, mark.y, halo + 4, { fill: 'transparent' })
  group.circle(mark.x, mark.y, halo, { 'class': 'plot-halo', 'fill': 'none', 'stroke': options.theme.magenta, 'stroke-width': 2, 'opacity': 0 })
  return group
}

/** Gain crossover on a curve: a triangle of the colour of gain above one. */
export function drawGainMark(pen: Pen, x: number, y: number, slope: 'falling' | 'rising', theme: PlotTheme): void {
  pen.fill(trianglePath(x, y, 8.5, slope), theme.buff, { 'stroke': theme.ink, 'stroke-width': theme.stroke.mark, 'stroke-linejoin': 'round' })
}

/** Phase crossover on a curve: a filled diamond, a small open one where it may be noise. */
export function drawPhaseMark(pen: Pen, x: number, y: number, theme: PlotTheme, faint = false): void {
  if (faint) return pen.fill(diamondPath(x, y, 2.6), theme.paper, { 'stroke': theme.sea, 'stroke-width': 0.8 })
  pen.fill(diamondPath(x, y, 5), theme.sea, { 'stroke': theme.paper, 'stroke-width': 0.8 })
}

/** Closest approach: an open circle, filled where it is under the criterion or the nearest of all, small where it may be noise. */
export function drawApproachMark(pen: Pen, x: number, y: number, style: ApproachStyle, theme: PlotTheme): void {
  const stroke = approachColour(style, theme)
  const fill = style === 'under' || style === 'nearest' ? stroke : theme.paper
  const radius = { nearest: 4, under: 4, clear: 3.6, faint: 1.8 }[style]
  pen.circle(x, y, radius, { fill, stroke, 'stroke-width': theme.stroke.mark })
}
