import type { Rectangle } from '../curves/Rectangle'
import type { MeasuredSample } from '../FigureData'
import type { Pen } from '../Pen'
import type { PlotTheme } from '../theme'

/** The measured samples as small points, where `place` puts them (px); those outside the panel are left out. */
export function drawSamples(pen: Pen, samples: readonly MeasuredSample[] | undefined, place: (sample: MeasuredSample) => [number, number], panel: Rectangle, theme: PlotTheme): void {
  let d = ''
  for (const sample of samples ?? []) {
    const [x, y] = place(sample)
    if (x < panel.x || y < panel.y || x > panel.x + panel.width || y > panel.y + panel.height) continue
    d += `M${tenth(x)} ${tenth(y)}h0`
  }
  pen.stroke(d, theme.slate, 2.6, { 'stroke-linecap': 'round' })
}

function tenth(value: number): number {
  return Math.round(value * 10) / 10
}
