import { curveStyle } from '../curves/curveStyle'
import type { FigureCurve } from '../FigureData'
import type { Pen } from '../Pen'
import { fitText } from '../text/fitText'
import { textWidth } from '../text/textWidth'
import type { PlotTheme } from '../theme'
import { sampleShape } from './drawSamples'

const sample = 26

/**
 * Names the curves of a figure, each with a piece of its line, in as many rows as the width needs; nothing for a single curve.
 * Returns the height taken (px).
 */
export function drawCurveKey(pen: Pen, curves: readonly FigureCurve[], x: number, y: number, width: number, theme: PlotTheme): number {
  if (curves.length < 2) return 0
  const size = theme.size.label
  const rowHeight = size + 7
  let [atX, atY] = [x, y]
  curves.forEach((curve, index) => {
    const name = fitText(curve.name, width - sample - 6, size)
    const needed = sample + 6 + textWidth(name, size)
    if (atX > x && atX + needed > x + width) [atX, atY] = [x, atY + rowHeight]
    const { stroke, width: lineWidth, attributes } = curveStyle(curves, index, theme)
    const [lineX, lineY] = [Math.round(atX), Math.round(atY + size * 0.65)]
    pen.stroke(`M${lineX} ${lineY}h${sample}`, stroke, lineWidth, attributes)
    if (curve.samples && index > 0) pen.stroke(sampleShape(index, lineX + sample / 2, lineY), theme.slate, 0.9)
    pen.text(name, atX + sample + 6, atY + size, { size, fill: theme.ink })
    atX += needed + 18
  })
  return atY - y + rowHeight + 2
}
