import type { LoopAnalysis } from '../../types/analysis'
import type { Rectangle } from '../curves/Rectangle'
import type { Pen } from '../Pen'
import type { PlotTheme } from '../theme'

const words = {
  stable: '',
  unstable: 'unstable: distances to −1, no margins',
  marginal: 'on the boundary of stability: no margins',
  undetermined: 'stability undetermined: distances to −1, no margins',
} as const satisfies Record<LoopAnalysis['stability']['verdict'], string>

/** Over the right end of a panel: that the closed loop is not stable, or not known to be. */
export function drawStanding(pen: Pen, { stability }: LoopAnalysis, panel: Rectangle, theme: PlotTheme): void {
  const text = words[stability.verdict]
  if (text === '') return
  const fill = stability.verdict === 'undetermined' ? theme.unshown : theme.unmet
  pen.text(text, panel.x + panel.width, panel.y - 6, { size: theme.size.label, fill, face: 'semibold', anchor: 'end' })
}
