import type { LoopAnalysis } from '../../types/analysis'
import type { Rectangle } from '../curves/Rectangle'
import type { Pen } from '../Pen'
import { textWidth } from '../text/textWidth'
import type { PlotTheme } from '../theme'

const words = {
  stable: '',
  unstable: 'unstable: distances to −1, no margins',
  marginal: 'on the boundary of stability: no margins',
  undetermined: 'stability undetermined: distances to −1, no margins',
} as const satisfies Record<LoopAnalysis['stability']['verdict'], string>

const short = { stable: '', unstable: 'unstable', marginal: 'no margins', undetermined: 'undetermined' } as const

/** Over the right end of a panel: that the closed loop is not stable, or not known to be; `title` stands at its left end. */
export function drawStanding(pen: Pen, { stability }: LoopAnalysis, panel: Rectangle, title: string, theme: PlotTheme): void {
  const room = panel.width - textWidth(title, theme.size.tick) - 12
  const whole = words[stability.verdict]
  const text = textWidth(whole, theme.size.label, 'semibold') <= room ? whole : short[stability.verdict]
  if (text === '') return
  const fill = stability.verdict === 'undetermined' ? theme.unshown : theme.unmet
  pen.text(text, panel.x + panel.width, panel.y - 6, { size: theme.size.label, fill, face: 'semibold', anchor: 'end' })
}
