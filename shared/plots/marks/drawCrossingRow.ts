import type { FrequencyUnit, LoopAnalysis } from '../../types/analysis'
import type { FigureMark, FigureOptions } from '../Figure'
import type { CrossingChartRow } from '../FigureData'
import type { Pen } from '../Pen'
import type { Rectangle } from '../curves/Rectangle'
import { stretchesAboveOne } from '../curves/stretchesAboveOne'
import { spreadLabels } from '../labels/spreadLabels'
import type { AxisScale } from '../scales/AxisScale'
import { formatSounding, plainDistance } from '../text/formatSounding'
import { hasMargins } from '../text/markWords'
import { textWidth } from '../text/textWidth'
import { isUnder } from './approachStyle'
import { drawHatching } from './drawHatching'
import { drawApproachMark, markGroup, trianglePath } from './drawMark'
import type { LoopMark } from './loopMarks'
import { nearestEnd } from './nearestEnd'
import { loopMarks } from './loopMarks'

/** px */
const bar = 12
const triangle = 6

/** Draws what one loop's row of the crossing chart holds at the height `middle`; returns its marks. */
export function drawCrossingRow(pen: Pen, row: CrossingChartRow, unit: FrequencyUnit, scale: AxisScale, panel: Rectangle, middle: number, options: FigureOptions): FigureMark[] {
  const { theme } = options
  const { analysis } = row
  const [low, high] = [panel.x, panel.x + panel.width]
  const clamp = (x: number) => Math.min(high, Math.max(low, x))
  const from = row.band ? clamp(scale.toPixel(row.band.from)) : low
  const to = row.band ? clamp(scale.toPixel(row.band.to)) : high

  if (!analysis) {
    pen.stroke(`M${tenth(low)} ${tenth(middle)}H${tenth(high)}`, theme.slate, theme.stroke.hair, { 'stroke-dasharray': '1 5', 'stroke-linecap': 'round' })
    return []
  }
  // The channel, ending where the data do.
  pen.stroke(`M${tenth(from)} ${tenth(middle)}H${tenth(to)}`, theme.channel, theme.stroke.curve)
  const ends = [from > low ? from : null, to < high ? to : null].filter(x => x !== null)
  pen.stroke(ends.map(x => `M${tenth(x)} ${tenth(middle - 5)}v10`).join(''), theme.slate, theme.stroke.axis)
  for (const exception of analysis.coverage.exceptions) {
    const end = exception.to === 'infinity' ? high : clamp(scale.toPixel(exception.to))
    const start = exception.from > 0 ? clamp(scale.toPixel(exception.from)) : low
    drawHatching(pen, start, end, { x: panel.x, y: middle - bar / 2 - 2, width: panel.width, height: bar + 4 }, theme)
  }
  for (const stretch of stretchesAboveOne(analysis.gainCrossovers, row.gainAboveOne)) {
    const x0 = stretch.from === null ? from : clamp(scale.toPixel(stretch.from))
    const x1 = stretch.to === null ? to : clamp(scale.toPixel(stretch.to))
    if (x1 < from || x0 > to) continue
    pen.rect(Math.min(x0, (x0 + x1) / 2 - 0.7), middle - bar / 2, Math.max(1.4, x1 - x0), bar, { 'fill': theme.buff, 'stroke': theme.ink, 'stroke-width': theme.stroke.axis, 'rx': Math.min(1.5, (x1 - x0) / 2) })
  }
  drawNearestEnd(pen, row, analysis, scale, [from, to], middle, options)
  return drawRowMarks(pen, row, analysis, unit, scale, panel, middle, options)
}

/** A loop that comes nearest to -1 at an end of its axis has its sounding there. */
function drawNearestEnd(pen: Pen, row: CrossingChartRow, analysis: LoopAnalysis, scale: AxisScale, [from, to]: [number, number], middle: number, { theme }: FigureOptions): void {
  const end = nearestEnd(analysis)
  if (!end) return
  const under = row.requiredVectorMargin !== null && end.distance < row.requiredVectorMargin && hasMargins(analysis)
  const place = end.frequency === 0 ? from : end.frequency === 'infinity' ? to : Math.min(to, Math.max(from, scale.toPixel(end.frequency)))
  const [x, low, fill] = [place, place < (from + to) / 2, under ? theme.unmet : theme.ink]
  drawApproachMark(pen, x, middle, under ? 'under' : 'clear', theme)
  pen.text(formatSounding(end.distance), low ? x + 7 : x - 7, middle - bar / 2 - 5, { size: theme.size.label, fill, face: 'semiboldItalic', anchor: low ? 'start' : 'end' })
}

function drawRowMarks(pen: Pen, row: CrossingChartRow, analysis: LoopAnalysis, unit: FrequencyUnit, scale: AxisScale, panel: Rectangle, middle: number, options: FigureOptions): FigureMark[] {
  const { theme } = options
  const [low, high] = [panel.x, panel.x + panel.width]
  const all = loopMarks(analysis, unit, row.requiredVectorMargin, `${row.key}/`)
    .map(mark => ({ ...mark, x: placeOnAxis(mark, scale, low, high), y: middle }))
    .filter(mark => mark.x >= low - 0.5 && mark.x <= high + 0.5)

  const gains = all.filter(mark => mark.kind === 'gain')
  const triangles = spreadLabels(gains.map(({ x }) => ({ x, width: triangle, weight: 1 })), low - 4, high + 4, 0.5, 9)
  const approaches = all.filter(mark => mark.kind === 'approach').filter(({ crossing }) => crossing.distance <= plainDistance && !crossing.withinNoise)
  const size = theme.size.label
  const soundings = approaches.map(mark => formatSounding(mark.crossing.distance))
  const middles = spreadLabels(approaches.map(({ x, crossing }, i) =>
    ({ x, width: textWidth(soundings[i]!, size, 'semiboldItalic'), weight: -crossing.distance })), low - 10, high + 10, 4, 20)

  for (const mark of all) {
    const group = markGroup(pen, mark, options)
    if (mark.kind === 'gain') {
      const x = triangles[gains.indexOf(mark)]
      if (x === null || x === undefined) continue
      const y = middle + bar / 2 + 6
      if (Math.abs(x - mark.x) > 1) group.stroke(`M${tenth(mark.x)} ${tenth(middle + bar / 2)}L${tenth(x)} ${tenth(y - 3)}`, theme.ink, 0.7)
      group.fill(trianglePath(x, y, triangle, mark.crossing.slope), theme.ink)
    }
    else if (mark.kind === 'phase') {
      const atEnd = typeof mark.frequency !== 'number' || mark.frequency === 0
      group.stroke(`M${tenth(mark.x)} ${tenth(middle - (mark.faint ? 5 : 9))}v${mark.faint ? 10 : 18}`, theme.sea, mark.faint ? 1 : 2.2)
      // At zero or infinite frequency the tick stands at the end of the axis with a barb outwards.
      if (atEnd) group.stroke(`M${tenth(mark.x)} ${tenth(middle - 4)}l${mark.frequency === 0 ? -5 : 5} 4l${mark.frequency === 0 ? 5 : -5} 4`, theme.sea, 1.3)
    }
    else {
      const i = approaches.indexOf(mark)
      const under = isUnder(mark.crossing, analysis, row.requiredVectorMargin)
      drawApproachMark(group, mark.x, middle, mark.crossing.withinNoise ? 'faint' : under ? 'under' : 'clear', theme)
      const x = i < 0 ? null : middles[i]
      if (x === null || x === undefined) continue
      const y = middle - bar / 2 - 5
      if (Math.abs(x - mark.x) > 4) group.stroke(`M${tenth(mark.x)} ${tenth(middle - 4)}L${tenth(x)} ${tenth(y + 1)}`, under ? theme.unmet : theme.ink, 0.7)
      pen.text(soundings[i]!, x, y, { size, fill: under ? theme.unmet : theme.ink, face: 'semiboldItalic', anchor: 'middle' })
    }
  }
  return all.map(({ id, kind, label, x, y }) => ({ id, kind, label, x, y }))
}

function placeOnAxis(mark: LoopMark, scale: AxisScale, low: number, high: number): number {
  if (mark.frequency === 'infinity') return high
  return mark.frequency === 0 ? low : scale.toPixel(mark.frequency)
}

function tenth(value: number): number {
  return Math.round(value * 10) / 10
}
