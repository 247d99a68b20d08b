import type { DrawFigure, FigureMark, FigureOptions } from '../Figure'
import type { CrossingChartData, CrossingChartRow } from '../FigureData'
import type { Pen } from '../Pen'
import type { Rectangle } from '../curves/Rectangle'
import { drawCrossingChartKey } from '../marks/drawCrossingChartKey'
import { drawCrossingRow } from '../marks/drawCrossingRow'
import { drawFrequencyGrid, drawFrequencyNumbers, frequencyAxisHeight, numberOverhang } from '../marks/drawFrequencyAxis'
import { logScale } from '../scales/logScale'
import { fitText } from '../text/fitText'
import { textWidth } from '../text/textWidth'
import type { PlotTheme } from '../theme'

/** px; below this the names stand over their rows. */
const narrow = 560

interface Columns {
  code: number
  name: number
  verdict: number
  stacked: boolean
}

/**
 * The crossing chart: one row a loop on a shared logarithmic frequency axis. A buff bar wherever the gain is above one, so that each of its edges is
 * a gain crossover; a tick at each phase crossover; each closest approach with its distance, as a sounding; the verdict in words at the end of the row.
 */
export const drawCrossingChart: DrawFigure<CrossingChartData> = (pen, data, options) => {
  const { theme, width } = options
  const columns = measureColumns(data.rows, width, theme)
  const rowHeight = columns.stacked ? 66 : theme.name === 'screen' ? 42 : 35
  const keyHeight = drawCrossingChartKey(pen, width, theme)
  const top = keyHeight + frequencyAxisHeight(theme) + 2
  const left = columns.stacked ? 4 : columns.code + columns.name
  const panel: Rectangle = { x: left, y: top, width: width - left - (columns.stacked ? numberOverhang(theme) : columns.verdict), height: Math.max(1, data.rows.length) * rowHeight }
  const scale = logScale(data.range.from, data.range.to, panel.x, panel.x + panel.width)

  drawFrequencyGrid(pen, scale, panel, theme)
  drawFrequencyNumbers(pen, scale, panel, data.frequencyUnit, theme, 'above')

  const marks: FigureMark[] = []
  data.rows.forEach((row, i) => {
    const rowTop = top + i * rowHeight
    const middle = columns.stacked ? rowTop + 46 : Math.round(rowTop + rowHeight * 0.52)
    drawRowWords(pen, row, columns, panel, rowTop, middle, options)
    marks.push(...drawCrossingRow(pen, row, data.frequencyUnit, scale, panel, middle, options))
  })

  return {
    width,
    height: top + panel.height + 4,
    panels: [{ ...panel, xScale: scale, yScale: scale }],
    marks,
    pointsAt: () => [],
    locate: (x, y) => {
      if (x < panel.x || x > panel.x + panel.width || y < panel.y || y >= panel.y + panel.height) return null
      const row = data.rows[Math.floor((y - panel.y) / rowHeight)]
      return row ? { frequency: scale.toValue(x), row: row.key } : null
    },
  }
}

function measureColumns(rows: readonly CrossingChartRow[], width: number, theme: PlotTheme): Columns {
  const { label } = theme.size
  const widest = (texts: string[], face: 'regular' | 'semibold') => Math.max(0, ...texts.map(text => textWidth(text, label, face)))
  const code = Math.min(widest(rows.map(row => row.code), 'semibold'), width * 0.14) + 14
  const name = Math.min(widest(rows.map(row => row.name), 'regular'), width * 0.17) + 18
  const verdict = Math.min(widest(rows.map(row => row.verdict), 'semibold'), width * 0.2) + 16
  return { code, name, verdict, stacked: width < narrow }
}

const standingColour = {
  'met': 'met',
  'not met': 'unmet',
  'accepted': 'unshown',
  'not shown': 'unshown',
  'unstable': 'unmet',
  'no data': 'slate',
  'not applicable': 'slate',
} as const satisfies Record<CrossingChartRow['standing'], keyof PlotTheme>

function drawRowWords(pen: Pen, row: CrossingChartRow, columns: Columns, panel: Rectangle, rowTop: number, middle: number, { theme, width }: FigureOptions): void {
  const size = theme.size.label
  const face = row.standing === 'unstable' || row.standing === 'not met' ? 'semibold' : 'regular'
  const fill = theme[standingColour[row.standing]]
  const baseline = columns.stacked ? rowTop + size + 4 : middle + size * 0.36
  if (columns.stacked) {
    const codeWidth = textWidth(row.code, size, 'semibold')
    const verdictWidth = textWidth(row.verdict, size, face)
    pen.text(row.code, panel.x, baseline, { size, fill: theme.ink, face: 'semibold' })
    pen.text(fitText(row.name, Math.max(0, panel.width - codeWidth - verdictWidth - 20), size), panel.x + codeWidth + 8, baseline, { size, fill: theme.slate })
    pen.text(row.verdict, panel.x + panel.width, baseline, { size, fill, face, anchor: 'end' })
    return
  }
  pen.text(fitText(row.code, columns.code - 12, size, 'semibold'), 0, baseline, { size, fill: theme.ink, face: 'semibold' })
  pen.text(fitText(row.name, columns.name - 16, size), columns.code, baseline, { size, fill: theme.slate })
  pen.text(fitText(row.verdict, columns.verdict - 14, size, face), width - columns.verdict + 14, baseline, { size, fill, face })
}
