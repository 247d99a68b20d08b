import type { Pen } from '../Pen'
import { textWidth } from '../text/textWidth'
import type { PlotTheme } from '../theme'
import { drawApproachMark, trianglePath } from './drawMark'

/** Says what the marks of the crossing chart stand for, in as many lines as the width needs; returns the height taken (px). */
export function drawCrossingChartKey(pen: Pen, width: number, theme: PlotTheme): number {
  const size = theme.size.tick
  const line = size + 9
  const entries: { text: string, sample: number, draw: (x: number, y: number) => void }[] = [
    {
      text: 'gain above one: each edge is a gain crossover',
      sample: 26,
      draw: (x, y) => pen.rect(x, y - 5, 26, 10, { 'fill': theme.buff, 'stroke': theme.ink, 'stroke-width': theme.stroke.axis, 'rx': 1.5 }),
    },
    {
      text: 'gain falling or rising there',
      sample: 20,
      draw: (x, y) => pen.fill(trianglePath(x + 4, y, 7, 'falling') + trianglePath(x + 15, y, 7, 'rising'), theme.ink),
    },
    {
      text: 'phase crossover',
      sample: 5,
      draw: (x, y) => pen.stroke(`M${x + 2} ${y - 7}v14`, theme.sea, 2.2),
    },
    {
      text: 'closest approach and its distance to −1',
      sample: 36,
      draw: (x, y) => {
        drawApproachMark(pen, x + 4, y, 'clear', theme)
        pen.text('0.64', x + 11, y + size * 0.36, { size, fill: theme.ink, face: 'semiboldItalic' })
      },
    },
    {
      text: 'under the criterion',
      sample: 36,
      draw: (x, y) => {
        drawApproachMark(pen, x + 4, y, 'under', theme)
        pen.text('0.41', x + 11, y + size * 0.36, { size, fill: theme.unmet, face: 'semiboldItalic' })
      },
    },
  ]
  let [x, y] = [0, line / 2]
  for (const { text, sample, draw } of entries) {
    const needed = sample + 6 + textWidth(text, size)
    if (x > 0 && x + needed > width) [x, y] = [0, y + line]
    const [atX, atY] = [Math.round(x) + 0.5, Math.round(y)]
    draw(atX, atY)
    pen.text(text, atX + sample + 6, atY + size * 0.36, { size, fill: theme.slate })
    x += needed + 18
  }
  return y + line / 2 + 4
}
