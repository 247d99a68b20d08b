import type { Rectangle } from '../curves/Rectangle'
import type { FigureCurve } from '../FigureData'
import type { Pen } from '../Pen'
import type { AxisScale } from '../scales/AxisScale'
import type { PlotTheme } from '../theme'
import { drawHatching } from './drawHatching'

/** Hatches the stretches of frequency in which the main curve, measured, cannot be trusted between its samples. */
export function drawUntrusted(pen: Pen, { untrusted }: FigureCurve, scale: AxisScale, panel: Rectangle, theme: PlotTheme): void {
  for (const { from, to } of untrusted ?? []) drawHatching(pen, scale.toPixel(Math.max(from, scale.from)), scale.toPixel(Math.min(to, scale.to)), panel, theme)
}

/** The end of a sampled loop's axis, pi/T, where it lies in the panel. */
export function drawHalfSampleRate(pen: Pen, { halfSampleRate }: FigureCurve, scale: AxisScale, panel: Rectangle, theme: PlotTheme): void {
  if (halfSampleRate === undefined || halfSampleRate < scale.from || halfSampleRate > scale.to * (1 + 1e-9)) return
  const x = Math.round(scale.toPixel(halfSampleRate) * 10) / 10
  pen.stroke(`M${x} ${panel.y}v${panel.height}`, theme.slate, theme.stroke.axis, { 'stroke-dasharray': '8 2 2 2' })
}
