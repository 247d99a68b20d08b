import type { DrawFigure, FigureMark, FigureOptions } from '../Figure'
import type { FigureCurve, LoopFigureData, MeasuredSample } from '../FigureData'
import type { Pen } from '../Pen'
import type { CurveViews } from '../curves/curveViews'
import type { Rectangle } from '../curves/Rectangle'
import { formatGainMargin } from '../../formatting/formatGainMargin'
import { formatPhaseMargin } from '../../formatting/formatPhaseMargin'
import { alignedViews } from '../curves/alignedViews'
import { curveStyle } from '../curves/curveStyle'
import type { PhaseWindow } from '../curves/phaseWindow'
import { phaseWindow, shownPhase } from '../curves/phaseWindow'
import { pointsInside } from '../curves/pointsInside'
import { samplePhase } from '../curves/samplePhase'
import { stretchesAboveOne } from '../curves/stretchesAboveOne'
import { valueOfView } from '../curves/valueOfView'
import { windingStart } from '../curves/windingStart'
import { wrapPhase } from '../curves/wrapPhase'
import { LabelField } from '../labels/LabelField'
import { drawCurve } from '../marks/drawCurve'
import { drawCurveKey } from '../marks/drawCurveKey'
import { drawFrequencyGrid, drawFrequencyNumbers, frequencyAxisHeight, numberOverhang } from '../marks/drawFrequencyAxis'
import { drawHatching } from '../marks/drawHatching'
import { drawLabel } from '../marks/drawLabel'
import { drawLevel, drawLevels } from '../marks/drawLevels'
import { drawApproachMark, drawGainMark, drawPhaseMark, markGroup } from '../marks/drawMark'
import { drawOtherSamples, drawSamples } from '../marks/drawSamples'
import { drawHalfSampleRate, drawUntrusted } from '../marks/drawUntrusted'
import { drawStanding } from '../marks/drawStanding'
import type { LoopMark } from '../marks/loopMarks'
import { loopMarks } from '../marks/loopMarks'
import { withoutCovered } from '../marks/withoutCovered'
import { gainWindow } from '../scales/gainWindow'
import type { AxisScale } from '../scales/AxisScale'
import { linearScale } from '../scales/linearScale'
import { linearTicks } from '../scales/linearTicks'
import { logScale } from '../scales/logScale'
import { hasMargins } from '../text/markWords'

interface Panels {
  x: AxisScale
  gain: AxisScale
  phase: AxisScale
  upper: Rectangle
  lower: Rectangle
}

const title = '|L|, dB'

/**
 * Gain and phase over frequency, one over the other on one frequency axis, with every crossing marked on both: a gain crossover on the line of 0 dB and,
 * below it, how far the phase there is from -180 deg; a phase crossover on that line and, above it, how far the gain there is from 0 dB.
 */
export const drawMagnitudePhase: DrawFigure<LoopFigureData> = (pen, data, options) => {
  const { theme, width } = options
  const main = data.curves[0]
  const views = alignedViews(data.curves)
  const window = phaseWindow(views.map(view => view.phase))
  const keyHeight = drawCurveKey(pen, data.curves, 0, 0, width, theme)
  const height = options.height ?? Math.round(Math.min(width * 0.82, 620)) + keyHeight
  const panels = layOut(data, views, window, width, height, keyHeight, options)
  const { x, gain, phase, upper, lower } = panels

  drawGround(pen, data, panels, options)
  drawStanding(pen, main.analysis, upper, title, theme)
  const fields = { upper: new LabelField(upper), lower: new LabelField(lower) }
  fields.upper.blockPolylines([[upper.x, gain.toPixel(0), upper.x + upper.width, gain.toPixel(0)]])
  fields.lower.blockPolylines(criticalPhases(phase).map(value => [lower.x, phase.toPixel(value), lower.x + lower.width, phase.toPixel(value)]))
  const isOverlaid = data.curves.length > 1
  const drawSamplesOn = (draw: (place: (sample: MeasuredSample) => [number, number], panel: Rectangle) => void, index: number) => {
    draw(({ frequency, re, im }) => [x.toPixel(frequency), gain.toPixel(20 * Math.log10(Math.hypot(re, im)))], upper)
    draw(sample => [x.toPixel(sample.frequency), phase.toPixel(shownPhase(samplePhase(sample, data.curves[index]!, views[index]!.phase), window))], lower)
  }
  if (isOverlaid) drawSamplesOn((place, panel) => drawSamples(pen, main.samples, place, panel, theme, true), 0)
  for (let index = data.curves.length - 1; index >= 0; index--) {
    const figureCurve = data.curves[index]!
    const xs = figureCurve.curve.frequency.map(x.toPixel)
    const style = curveStyle(data.curves, index, theme)
    fields.upper.blockPolylines(drawCurve(pen, figureCurve, style, xs, views[index]!.gain.map(gain.toPixel), upper))
    const end = windingStart(views[index]!.phase, xs, closestTurns)
    const wrapped = wrapPhase(figureCurve.curve.frequency, { ...views[index]!, phase: views[index]!.phase.subarray(0, end) }, window)
    if (index === 0 && end < xs.length) drawWinding(pen, fields.lower, xs[end]!, panels, options)
    const shown: FigureCurve = { ...figureCurve, curve: { ...figureCurve.curve, frequency: wrapped.frequency } }
    fields.lower.blockPolylines(drawCurve(pen, shown, style, wrapped.frequency.map(x.toPixel), wrapped.phase.map(phase.toPixel), lower))
    if (index > 0) drawSamplesOn((place, panel) => drawOtherSamples(pen, figureCurve.samples, index, place, panel, theme), index)
  }
  if (!isOverlaid) drawSamplesOn((place, panel) => drawSamples(pen, main.samples, place, panel, theme), 0)

  const placed: { mark: LoopMark, kind: LoopMark['kind'], at: MarkPlaces, x: number, y: number }[] = []
  for (const mark of loopMarks(main.analysis, data.frequencyUnit, data.requiredVectorMargin)) {
    if (typeof mark.frequency !== 'number' || mark.frequency < data.range.from || mark.frequency > data.range.to) continue
    const at = markPlaces(mark, mark.frequency, main, views[0]!, panels, window)
    if (!at) continue
    for (const [field, place] of [[fields.upper, at.upper], [fields.lower, at.lower]] as const) field.blockRectangle({ x: at.x - 6, y: place - 6, width: 12, height: 12 })
    blockBars(fields, mark, at, panels)
    placed.push({ mark, kind: mark.kind, at, x: at.x, y: mark.kind === 'phase' ? at.lower : at.upper })
  }
  const shown = withoutCovered(placed)
  for (const one of placed) drawMarkOnBoth(pen, one.mark, one.at, shown.has(one), data, panels, options)
  for (const { mark, at } of shown) labelMark(pen, mark, at, fields, main, options)
  const marks: FigureMark[] = placed.map(({ mark: { id, kind, label }, x: px, y: py }) => ({ id, kind, label, x: px, y: py }))

  return {
    width,
    height,
    panels: [{ ...upper, xScale: x, yScale: gain }, { ...lower, xScale: x, yScale: phase }],
    marks,
    locate: (px, py) => {
      const inside = [upper, lower].some(panel => px >= panel.x && px <= panel.x + panel.width && py >= panel.y && py <= panel.y + panel.height)
      return inside ? { frequency: x.toValue(px) } : null
    },
    pointsAt: (frequency) => {
      const decibels = valueOfView(main.curve, views[0]!.gain, frequency)
      const degrees = valueOfView(main.curve, views[0]!.phase, frequency)
      if (decibels === null || degrees === null) return []
      return pointsInside([[x.toPixel(frequency), gain.toPixel(decibels), upper], [x.toPixel(frequency), phase.toPixel(shownPhase(degrees, window)), lower]])
    },
  }
}

function layOut(data: LoopFigureData, views: CurveViews[], window: PhaseWindow, width: number, height: number, top: number, { theme }: FigureOptions): Panels {
  const size = theme.size.tick
  const left = size * 4
  const between = size + 18
  const room = height - top - size - 10 - between - frequencyAxisHeight(theme)
  const upper = { x: left, y: top + size + 10, width: width - left - numberOverhang(theme), height: Math.round(room * 0.54) }
  const lower = { ...upper, y: upper.y + upper.height + between, height: room - upper.height }
  const { from, to } = gainWindow(views.map(view => view.gain))
  return {
    upper,
    lower,
    x: logScale(data.range.from, data.range.to, upper.x, upper.x + upper.width),
    gain: linearScale(from, to, upper.y + upper.height, upper.y),
    phase: linearScale(window.from, window.to, lower.y + lower.height, lower.y),
  }
}

function drawGround(pen: Pen, data: LoopFigureData, { x, gain, phase, upper, lower }: Panels, { theme }: FigureOptions): void {
  const main = data.curves[0]
  for (const stretch of stretchesAboveOne(main.analysis.gainCrossovers, (main.curve.re[0] ?? 0) ** 2 + (main.curve.im[0] ?? 0) ** 2 > 1)) {
    const [from, to] = [x.toPixel(Math.max(stretch.from ?? x.from, x.from)), x.toPixel(Math.min(stretch.to ?? x.to, x.to))]
    if (to > from) for (const panel of [upper, lower]) pen.rect(from, panel.y, Math.max(1, to - from), panel.height, { fill: theme.buff })
  }
  for (const panel of [upper, lower]) {
    drawFrequencyGrid(pen, x, panel, theme)
    drawUntrusted(pen, main, x, panel, theme)
    drawHalfSampleRate(pen, main, x, panel, theme)
  }
  drawLevels(pen, gain, linearTicks(gain.from, gain.to, upper.height / 24, [5, 10, 20, 40]), upper, title, theme)
  drawLevels(pen, phase, linearTicks(phase.from, phase.to, lower.height / 20, [30, 45, 90, 180, 360]), lower, 'phase of L, deg', theme)
  drawLevel(pen, gain, 0, upper, theme.ink, theme.stroke.axis)
  for (const critical of criticalPhases(phase)) drawLevel(pen, phase, critical, lower, theme.ink, theme.stroke.axis)
  drawFrequencyNumbers(pen, x, lower, data.frequencyUnit, theme, 'below')
}

/** px; turns closer than this are told by hatching. */
const closestTurns = 3

/** The part of the phase panel in which the phase turns too fast to be drawn. */
function drawWinding(pen: Pen, field: LabelField, from: number, { lower }: Panels, { theme }: FigureOptions): void {
  drawHatching(pen, from, lower.x + lower.width, lower, theme)
  field.blockRectangle({ ...lower, x: from, width: lower.x + lower.width - from })
  const size = theme.size.tick
  pen.text('hatched: turns too fast to draw', lower.x + lower.width, lower.y - 6, { size, fill: theme.slate, anchor: 'end' })
}

/** Odd multiples of half a turn within an axis. */
function criticalPhases({ from, to }: AxisScale): number[] {
  const list: number[] = []
  for (let angle = Math.ceil((from - 180) / 360) * 360 + 180; angle <= to; angle += 360) list.push(angle)
  return list
}

interface MarkPlaces {
  x: number
  /** px in the gain panel, and in the phase panel */
  upper: number
  lower: number
  /** px of the nearest odd multiple of half a turn */
  critical: number
}

function markPlaces(mark: LoopMark, frequency: number, main: FigureCurve, views: CurveViews, { x, gain, phase, upper }: Panels, window: PhaseWindow): MarkPlaces | null {
  const decibels = mark.kind === 'gain' ? 0 : valueOfView(main.curve, views.gain, frequency)
  const degrees = valueOfView(main.curve, views.phase, frequency)
  if (decibels === null || degrees === null) return null
  const shown = shownPhase(degrees, window)
  const critical = 360 * Math.round((shown - 180) / 360) + 180
  return {
    x: x.toPixel(frequency),
    upper: Math.max(upper.y, Math.min(upper.y + upper.height, gain.toPixel(decibels))),
    lower: phase.toPixel(mark.kind === 'phase' ? critical : shown),
    critical: phase.toPixel(critical),
  }
}

/** Labels keep off the bars of the margins, too. */
function blockBars(fields: { upper: LabelField, lower: LabelField }, mark: LoopMark, at: MarkPlaces, { gain }: Panels): void {
  if (mark.kind === 'gain') fields.lower.blockPolylines([[at.x, at.lower, at.x, at.critical]])
  else if (mark.kind === 'phase') fields.upper.blockPolylines([[at.x, at.upper, at.x, gain.toPixel(0)]])
}

function drawMarkOnBoth(pen: Pen, mark: LoopMark, at: MarkPlaces, shown: boolean, data: LoopFigureData, { gain }: Panels, options: FigureOptions): void {
  const { theme } = options
  const { analysis } = data.curves[0]
  const primary = mark.kind === 'phase' ? at.lower : at.upper
  const group = markGroup(pen, { ...mark, x: at.x, y: primary }, options)
  const vertical = (from: number, to: number) => `M${tenth(at.x)} ${tenth(from)}V${tenth(to)}`
  const margins = hasMargins(analysis)
  if (options.interactive) {
    group.circle(at.x, mark.kind === 'phase' ? at.upper : at.lower, 9, { 'class': 'plot-halo', 'fill': 'none', 'stroke': theme.magenta, 'stroke-width': 2, 'opacity': 0 })
  }
  if (!shown) return
  if (mark.kind === 'gain') {
    if (margins) group.stroke(vertical(at.lower, at.critical), theme.ink, theme.stroke.curve)
    drawGainMark(group, at.x, at.upper, mark.crossing.slope, theme)
    drawGainMark(group, at.x, at.lower, mark.crossing.slope, theme)
  }
  else if (mark.kind === 'phase') {
    if (margins && !mark.faint) group.stroke(vertical(at.upper, gain.toPixel(0)), theme.sea, theme.stroke.curve)
    drawPhaseMark(group, at.x, at.upper, theme, mark.faint)
    drawPhaseMark(group, at.x, at.lower, theme, mark.faint)
  }
  else {
    drawApproachMark(group, at.x, at.upper, mark.style, theme)
    drawApproachMark(group, at.x, at.lower, mark.style, theme)
  }
}

/** The margin at a crossing in words, in the panel in which it is measured, where there is room. */
function labelMark(pen: Pen, mark: LoopMark, at: MarkPlaces, fields: { upper: LabelField, lower: LabelField }, main: FigureCurve, { theme }: FigureOptions): void {
  if (!hasMargins(main.analysis)) return
  const size = theme.size.tick
  if (mark.kind === 'gain') {
    drawLabel(pen, fields.lower, [{ text: formatPhaseMargin(mark.crossing.phaseMargin), size, fill: theme.ink }], { x: at.x, y: at.lower, gap: 7, reach: 34, prefer: 20 }, theme)
  }
  else if (mark.kind === 'phase' && !mark.faint) {
    drawLabel(pen, fields.upper, [{ text: formatGainMargin(mark.crossing.gainMargin), size, fill: theme.sea }], { x: at.x, y: at.upper, gap: 7, reach: 34, prefer: 20 }, theme)
  }
}

function tenth(value: number): number {
  return Math.round(value * 10) / 10
}
