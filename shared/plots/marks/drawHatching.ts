import type { Rectangle } from '../curves/Rectangle'
import type { Pen } from '../Pen'
import type { PlotTheme } from '../theme'

const step = 6

/** Hatches the part of a panel between two px of its width, slanted so that it is told from the grid. */
export function drawHatching(pen: Pen, from: number, to: number, panel: Rectangle, theme: PlotTheme): void {
  const left = Math.max(panel.x, Math.min(from, to))
  const right = Math.min(panel.x + panel.width, Math.max(from, to))
  if (right < left) return
  const { y: top, height } = panel
  const bottom = top + height
  let d = ''
  // Lines x + y = c, at the same c in every figure so that neighbouring stretches join.
  for (let c = Math.ceil((left + top) / step) * step; c < right + bottom; c += step) {
    const x0 = Math.max(left, c - bottom)
    const x1 = Math.min(right, c - top)
    if (x1 > x0) d += `M${tenth(x0)} ${tenth(c - x0)}L${tenth(x1)} ${tenth(c - x1)}`
  }
  pen.stroke(d, theme.slate, 0.6, { opacity: 0.55 })
  pen.stroke(`M${tenth(left)} ${tenth(top)}V${tenth(bottom)}M${tenth(right)} ${tenth(top)}V${tenth(bottom)}`, theme.slate, 0.6, { opacity: 0.55 })
}

function tenth(value: number): number {
  return Math.round(value * 10) / 10
}
