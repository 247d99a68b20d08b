import type { DrawFigure, FigureMark } from '../Figure'
import type { LoopFigureData } from '../FigureData'
import type { Polyline } from '../curves/clipPolyline'
import type { Rectangle } from '../curves/Rectangle'
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
import { drawSamples } from '../marks/drawSamples'
import { drawHalfSampleRate, drawUntrusted } from '../marks/drawUntrusted'
import { drawStanding } from '../marks/drawStanding'
import { loopMarks, nearestApproach } from '../marks/loopMarks'
import { withoutCovered } from '../marks/withoutCovered'
import { logScale } from '../scales/logScale'
import { logTicks } from '../scales/logTicks'
import { formatFrequency } from '../../formatting/formatFrequency'
import { formatSounding, plainDistance } from '../text/formatSounding'
import { textWidth } from '../text/textWidth'

/** Greatest |1 + L| shown: far from -1 there is nothing to see. */
const highest = 10

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

  // Tints first: under one, and under the criterion.
  pen.rect(panel.x, y.toPixel(1), panel.width, panel.y + panel.height - y.toPixel(1), { fill: theme.shoal[0] })
  if (required !== null) pen.rect(panel.x, y.toPixel(required), panel.width, panel.y + panel.height - y.toPixel(required), { fill: theme.shoal[1] })
  drawFrequencyGrid(pen, x, panel, theme)
  drawLevels(pen, y, logTicks(y.from, y.to, Math.floor(panel.height / 22)).filter(tick => tick.major).map(tick => tick.value), panel, '|1 + L|, distance to −1', theme)
  drawFrequencyNumbers(pen, x, panel, data.frequencyUnit, theme, 'below')
  drawStanding(pen, main.analysis, panel, theme)
  drawUntrusted(pen, main, x, panel, theme)
  drawHalfSampleRate(pen, main, x, panel, theme)
  drawLevel(pen, y, 1, panel, theme.slate, theme.stroke.axis)
  if (required !== null) {
    drawLevel(pen, y, required, panel, theme.ink, theme.stroke.mark, '5 3')
    field.blockPolylines([[panel.x, y.toPixel(required), panel.x + panel.width, y.toPixel(required)]])
  }

  for (let index = data.curves.length - 1; index >= 0; index--) {
    const figureCurve = data.curves[index]!
    const { distance } = curveViews(figureCurve.curve)
    const pieces: Polyline[] = drawCurve(pen, figureCurve, index, figureCurve.curve.frequency.map(x.toPixel), distance.map(y.toPixel), panel, theme)
    field.blockPolylines(pieces)
  }
  drawSamples(pen, main.samples, ({ frequency, re, im }) => [x.toPixel(frequency), y.toPixel(Math.hypot(1 + re, im))], panel, theme)

  const marks: FigureMark[] = []
  const nearest = `approach-${nearestApproach(main.analysis)}`
  const approaches = loopMarks(main.analysis, data.frequencyUnit)
    .filter(mark => mark.kind === 'approach')
    .map(mark => ({ ...mark, x: x.toPixel(mark.crossing.frequency), y: y.toPixel(mark.crossing.distance) }))
    .filter(mark => mark.x >= panel.x - 0.5 && mark.x <= panel.x + panel.width + 0.5)
  const shown = withoutCovered(approaches)
  for (const mark of approaches) {
    const under = required !== null && mark.crossing.distance < required
    const style = mark.id === nearest ? 'nearest' : under ? 'under' : 'clear'
    const colour = { nearest: theme.magenta, under: theme.unmet, clear: theme.sea }[style]
    const group = markGroup(pen, mark, options)
    group.stroke(`M${Math.round(mark.x * 10) / 10} ${Math.round(y.toPixel(1) * 10) / 10}V${Math.round(mark.y * 10) / 10}`, colour, theme.stroke.mark)
    if (shown.has(mark)) drawApproachMark(group, mark.x, mark.y, style, theme)
    field.blockRectangle({ x: mark.x - 5, y: mark.y - 5, width: 10, height: 10 })
    field.blockPolylines([[mark.x, y.toPixel(1), mark.x, mark.y]])
    const { id, kind, label } = mark
    marks.push({ id, kind, label, x: mark.x, y: mark.y })
  }
  // The least first: where there is no room for all, the deepest are told.
  for (const mark of [...shown].filter(({ crossing }) => crossing.distance < plainDistance || approaches.length < 12).sort((a, b) => a.crossing.distance - b.crossing.distance)) {
    const under = required !== null && mark.crossing.distance < required
    const isNearest = mark.id === nearest
    const text = formatSounding(mark.crossing.distance)
    const fill = isNearest ? theme.magenta : under ? theme.unmet : theme.ink
    const lines = [{ text, size: theme.size.label, fill, face: 'semiboldItalic' as const }]
    if (isNearest) lines.push({ text: formatFrequency(mark.crossing.frequency, data.frequencyUnit), size: theme.size.tick, fill, face: 'semiboldItalic' })
    drawLabel(pen, field, lines, { x: mark.x, y: mark.y, gap: 6, reach: isNearest || under ? 90 : 32, prefer: -90 }, theme, isNearest)
  }
  if (required !== null) {
    const text = `required ${required.toFixed(2)}`
    const size = theme.size.tick
    const wide = textWidth(text, size)
    const baseline = y.toPixel(required) + size + 2
    const places = [panel.x + 8, panel.x + panel.width - wide - 8, panel.x + panel.width / 2 - wide / 2, panel.x + panel.width / 4]
    const at = places.find(place => field.isFree({ x: place, y: baseline - size, width: wide, height: size + 2 })) ?? places[0]!
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
  const distances = data.curves.flatMap(({ analysis }) => analysis.closestApproaches.map(approach => approach.distance))
  const least = Math.max(1e-4, Math.min(0.2, (data.requiredVectorMargin ?? 0.5) / 2, ...distances.map(distance => distance * 0.6)))
  const power = 10 ** Math.floor(Math.log10(least) + 1e-9)
  return Number(([5, 2, 1].find(digit => digit * power <= least * (1 + 1e-9))! * power).toPrecision(3))
}
