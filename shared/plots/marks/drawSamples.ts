import type { Rectangle } from '../curves/Rectangle'
import type { MeasuredSample } from '../FigureData'
import type { Pen } from '../Pen'
import type { PlotTheme } from '../theme'

/** px; half the size of a sample's mark, and the least way between two of them */
const [half, apart] = [2.1, 8]

/** Shapes that tell the samples of one curve from another's where several are drawn over each other. */
const shapes: readonly ((x: number, y: number) => string)[] = [
  (x, y) => `M${tenth(x - half)} ${tenth(y - half)}l${2 * half} ${2 * half}m${-2 * half} 0l${2 * half} ${-2 * half}`,
  (x, y) => `M${tenth(x)} ${tenth(y - half - 0.5)}v${2 * half + 1}M${tenth(x - half - 0.5)} ${tenth(y)}h${2 * half + 1}`,
  (x, y) => `M${tenth(x - half)} ${tenth(y - half)}h${2 * half}v${2 * half}h${-2 * half}z`,
  (x, y) => `M${tenth(x)} ${tenth(y - half - 0.6)}l${half + 0.5} ${2 * half}h${-2 * half - 1}z`,
]

/**
 * The measured samples of the main curve as small points, where `place` puts them (px); those outside the panel are left out. Drawn lightly `under`
 * other curves, where these would be lost among them.
 */
export function drawSamples(pen: Pen, samples: readonly MeasuredSample[] | undefined, place: (sample: MeasuredSample) => [number, number], panel: Rectangle, theme: PlotTheme, under = false): void {
  const d = placesInside(samples, place, panel).map(([x, y]) => `M${tenth(x)} ${tenth(y)}h0`).join('')
  pen.stroke(d, under ? theme.channel : theme.slate, 2.6, { 'stroke-linecap': 'round' })
}

/**
 * The measured samples of a curve drawn beside the main one, in the shape of its index. Marks that would run into one another are thinned: the line of
 * the curve goes through every sample.
 */
export function drawOtherSamples(pen: Pen, samples: readonly MeasuredSample[] | undefined, index: number, place: (sample: MeasuredSample) => [number, number], panel: Rectangle, theme: PlotTheme): void {
  let [lastX, lastY] = [Number.NEGATIVE_INFINITY, 0]
  let d = ''
  for (const [x, y] of placesInside(samples, place, panel)) {
    if (Math.hypot(x - lastX, y - lastY) < apart) continue
    ;[lastX, lastY] = [x, y]
    d += sampleShape(index, x, y)
  }
  pen.stroke(d, theme.slate, 0.9)
}

/** The mark of a sample of the curve at `index`, beside the main one, as path data. */
export const sampleShape = (index: number, x: number, y: number): string => shapes[(index - 1) % shapes.length]!(x, y)

function placesInside(samples: readonly MeasuredSample[] | undefined, place: (sample: MeasuredSample) => [number, number], panel: Rectangle): [number, number][] {
  return (samples ?? []).map(place).filter(([x, y]) => x >= panel.x && y >= panel.y && x <= panel.x + panel.width && y <= panel.y + panel.height)
}

function tenth(value: number): number {
  return Math.round(value * 10) / 10
}
