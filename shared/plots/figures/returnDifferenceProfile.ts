import type { DrawFigure, FigureMark } from '../Figure'
import type { LoopFigureData, MeasuredSample } from '../FigureData'
import type { Polyline } from '../curves/clipPolyline'
import type { Rectangle } from '../curves/Rectangle'
import { curveStyle } from '../curves/curveStyle'
import { curveViews } from '../curves/curveViews'
import { interpolateCurve } from '../curves/interpolateCurve'
import { pointsInside } from '../curves/pointsInside'
import { LabelField } from '../labels/LabelField'
import { drawCurve } from '../marks/drawCurve'
import { drawCurveKey } from '../marks/drawCurveKey'
import { drawFrequencyGrid, drawFrequencyNumbers, frequencyAxisHeight, numberOverhang } from '../marks/drawFrequencyAxis'
import { drawLabel } from '../marks/drawLabel'
import { drawLevel, drawLevels } from '../marks/drawLevels'
import { drawApproachMark, markGroup } from '../marks/drawMark'
import { drawOtherSamples, drawSamples } from '../marks/drawSamples'
import { drawHalfSampleRate, drawUntrusted } from '../marks/drawUntrusted'
import { drawStanding } from '../marks/drawStanding'
import { approachColour } from '../marks/approachStyle'
import { nearestEnd } from '../marks/nearestEnd'
import { loopMarks } from '../marks/loopMarks'
import { withoutCovered } from '../marks/withoutCovered'
import { logScale } from '../scales/logScale'
import { logTicks } from '../scales/logTicks'
import { formatFrequency } from '../../formatting/formatFrequency'
import { formatSounding, plainDistance } from '../text/formatSounding'
import { textWidth } from '../text/textWidth'

/** Greatest |1 + L| shown: far from -1 there is nothing to see. */
const highest = 10

const title = '|1 + L|, distance to −1'

/**
 * The return difference profile: |1 + L| over frequency on logarithmic axes, tinted under one and under the criterion; each minimum hangs
 * from the line of one and is numbered with its distance, as a sounding.
 */
export const drawReturnDifferenceProfile: DrawFigure<LoopFigureData> = (pen, data, options) => {
  const { theme, width } = options
  const keyHeight = drawCurveKey(pen, data.curves, 0, 0, width, theme)
  const height = options.height ?? Math.round(Math.min(width * 0.56, 400)) + keyHeight
  const top = keyHeight + theme.size.tick + 10
  const left = theme.size.tick * 3.2
  const panel: Rectangle = { x: left, y: top, width: width - left - numberOverhang(theme), height: height - top - frequencyAxisHeight(theme) }
  const main = data.curves[0]
  const required = data.requiredVectorMargin
  const x = logScale(data.range.from, data.range.to, panel.x, panel.x + panel.width)
  const y = logScale(lowestShown(data), highest, panel.y + panel.height, panel.y)
  const field = new LabelField(panel)
  const samplePlace = ({ frequency, re, im }: MeasuredSample): [number, number] => [x.toPixel(frequency), y.toPixel(Math.hypot(1 + re, im))]

  // Tints first: under one, and under the criterion.
  pen.rect(panel.x, y.toPixel(1), panel.width, panel.y + panel.height - y.toPixel(1), { fill: theme.shoal[0] })
  if (required !== null) pen.rect(panel.x, y.toPixel(required), panel.width, panel.y + panel.height - y.toPixel(required), { fill: theme.shoal[1] })
  drawFrequencyGrid(pen, x, panel, theme)
  drawLevels(pen, y, logTicks(y.from, y.to, Math.floor(panel.height / 22)).filter(tick => tick.major).map(tick => tick.value), panel, title, theme)
  drawFrequencyNumbers(pen, x, panel, data.frequencyUnit, theme, 'below')
  drawStanding(pen, main.analysis, panel, title, theme)
  drawUntrusted(pen, main, x, panel, theme)
  drawHalfSampleRate(pen, main, x, panel, theme)
  drawLevel(pen, y, 1, panel, theme.slate, theme.stroke.axis)
  if (required !== null) {
    drawLevel(pen, y, required, panel, theme.ink, theme.stroke.mark, '5 3')
    field.blockPolylines([[panel.x, y.toPixel(required), panel.x + panel.width, y.toPixel(required)]])
  }

  const isOverlaid = data.curves.length > 1
  if (isOverlaid) drawSamples(pen, main.samples, samplePlace, panel, theme, true)
  for (let index = data.curves.length - 1; index >= 0; index--) {
    const figureCurve = data.curves[index]!
    const { distance } = curveViews(figureCurve.curve)
    const pieces: Polyline[] = drawCurve(pen, figureCurve, curveStyle(data.curves, index, theme), figureCurve.curve.frequency.map(x.toPixel), distance.map(y.toPixel), panel)
    field.blockPolylines(pieces)
    if (index > 0) drawOtherSamples(pen, figureCurve.samples, index, samplePlace, panel, theme)
  }
  if (!isOverlaid) drawSamples(pen, main.samples, samplePlace, panel, theme)

  const marks: FigureMark[] = []
  const approaches = loopMarks(main.analysis, data.frequencyUnit, required)
    .filter(mark => mark.kind === 'approach')
    .map(mark => ({ ...mark, x: x.toPixel(mark.crossing.frequency), y: y.toPixel(mark.crossing.distance) }))
    .filter(mark => mark.x >= panel.x - 0.5 && mark.x <= panel.x + panel.width + 0.5)
  const shown = withoutCovered(approaches)
  for (const mark of approaches) {
    const { style } = mark
    const colour = style === 'clear' ? theme.sea : approachColour(style, theme)
    const group = markGroup(pen, mark, options)
    if (style !== 'faint') group.stroke(`M${Math.round(mark.x * 10) / 10} ${Math.round(y.toPixel(1) * 10) / 10}V${Math.round(mark.y * 10) / 10}`, colour, theme.stroke.mark)
    if (shown.has(mark)) drawApproachMark(group, mark.x, mark.y, style, theme)
    field.blockRectangle({ x: mark.x - 5, y: mark.y - 5, width: 10, height: 10 })
    field.blockPolylines([[mark.x, y.toPixel(1), mark.x, mark.y]])
    const { id, kind, label } = mark
    marks.push({ id, kind, label, x: mark.x, y: mark.y })
  }
  const end = nearestEnd(main.analysis)
  if (end) {
    // Nearest at an end of the axis: told at the edge of the panel that lies towards it.
    const edge = end.frequency === 'infinity' ? x.to : Math.max(x.from, Math.min(x.to, end.frequency))
    const [px, py] = [x.toPixel(edge), y.toPixel(Math.max(y.from, end.distance))]
    drawApproachMark(pen, px, py, 'nearest', theme)
    const place = end.frequency === 'infinity' ? 'towards infinite frequency' : end.frequency === 0 ? 'at zero frequency' : formatFrequency(end.frequency, data.frequencyUnit)
    const [fill, face] = [theme.magenta, 'semiboldItalic' as const]
    drawLabel(pen, field, [{ text: formatSounding(end.distance), size: theme.size.label, fill, face }, { text: place, size: theme.size.tick, fill, face }],
      { x: px, y: py, gap: 6, reach: 90, prefer: -90 }, theme, true)
  }
  // The least first: where there is no room for all, the deepest are told.
  for (const mark of [...shown].filter(({ style }) => style !== 'faint').filter(({ crossing }) => crossing.distance < plainDistance || approaches.length < 12).sort((a, b) => a.crossing.distance - b.crossing.distance)) {
    const isNearest = mark.style === 'nearest'
    const text = formatSounding(mark.crossing.distance)
    const fill = approachColour(mark.style, theme)
    const lines = [{ text, size: theme.size.label, fill, face: 'semiboldItalic' as const }]
    if (isNearest) lines.push({ text: formatFrequency(mark.crossing.frequency, data.frequencyUnit), size: theme.size.tick, fill, face: 'semiboldItalic' })
    drawLabel(pen, field, lines, { x: mark.x, y: mark.y, gap: 6, reach: isNearest || mark.style === 'under' ? 90 : 32, prefer: -90 }, theme, isNearest)
  }
  if (required !== null) {
    const text = `required ${required.toFixed(2)}`
    const size = theme.size.tick
    const wide = textWidth(text, size)
    const room = panel.width - wide - 16
    const places = [size + 2, -5].flatMap(down => [0, 1, 0.5, 0.25, 0.75, 0.12, 0.88].map(part => ({ x: panel.x + 8 + part * room, baseline: y.toPixel(required) + down })))
    const free = ({ x: left, baseline }: { x: number, baseline: number }) => field.isFree({ x: left, y: baseline - size + 1, width: wide, height: size })
    const { x: at, baseline } = places.find(free) ?? places[0]!
    pen.text(text, at, baseline, { size, fill: theme.ink })
  }

  return {
    width,
    height,
    panels: [{ ...panel, xScale: x, yScale: y }],
    marks,
    locate: (px, py) => px < panel.x || px > panel.x + panel.width || py < panel.y || py > panel.y + panel.height ? null : { frequency: x.toValue(px) },
    pointsAt: (frequency) => {
      const value = interpolateCurve(main.curve, frequency)
      return value ? pointsInside([[x.toPixel(frequency), y.toPixel(Math.hypot(1 + value.re, value.im)), panel]]) : []
    },
  }
}

/** The lower end of the axis: under the least distance and half the criterion, at 1, 2 or 5 times a power of ten. */
function lowestShown(data: LoopFigureData): number {
  const distances = data.curves.flatMap(({ analysis }) => [...analysis.closestApproaches, ...(analysis.vectorMargin ? [analysis.vectorMargin] : [])].map(({ distance }) => distance))
  const least = Math.max(1e-4, Math.min(0.2, (data.requiredVectorMargin ?? 0.5) / 2, ...distances.map(distance => distance * 0.6)))
  const power = 10 ** Math.floor(Math.log10(least) + 1e-9)
  return Number(([5, 2, 1].find(digit => digit * power <= least * (1 + 1e-9))! * power).toPrecision(3))
}
