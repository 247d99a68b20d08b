import type { DrawFigure, FigureMark, FigureOptions } from '../Figure'
import type { FigureCurve, LoopFigureData, MeasuredSample } from '../FigureData'
import type { Pen } from '../Pen'
import { alignedViews } from '../curves/alignedViews'
import { curveUpTo } from '../curves/curveUpTo'
import { clipPolyline } from '../curves/clipPolyline'
import type { CurveViews } from '../curves/curveViews'
import { curveStyle } from '../curves/curveStyle'
import { distanceContour } from '../curves/distanceContour'
import { nearestOnCurve } from '../curves/nearestOnCurve'
import { pathData } from '../curves/pathData'
import type { PhaseWindow } from '../curves/phaseWindow'
import { phaseWindow, shownPhase } from '../curves/phaseWindow'
import type { Rectangle } from '../curves/Rectangle'
import { pointsInside } from '../curves/pointsInside'
import { samplePhase } from '../curves/samplePhase'
import { shoalDistances } from '../curves/shoalDistances'
import { valueOfView } from '../curves/valueOfView'
import { windingStart } from '../curves/windingStart'
import { wrapPhase } from '../curves/wrapPhase'
import { formatGainMargin } from '../../formatting/formatGainMargin'
import { formatPhaseMargin } from '../../formatting/formatPhaseMargin'
import { LabelField } from '../labels/LabelField'
import { drawCurve } from '../marks/drawCurve'
import { drawCurveKey } from '../marks/drawCurveKey'
import { drawDirection, drawFrequencyMarks } from '../marks/drawFrequencyMarks'
import { drawHatching } from '../marks/drawHatching'
import { drawLabel } from '../marks/drawLabel'
import { drawLevel, drawLevels } from '../marks/drawLevels'
import { drawApproachMark, drawGainMark, drawPhaseMark, markGroup } from '../marks/drawMark'
import { drawOtherSamples, drawSamples } from '../marks/drawSamples'
import { drawStanding } from '../marks/drawStanding'
import type { LoopMark } from '../marks/loopMarks'
import { approachColour } from '../marks/approachStyle'
import { loopMarks } from '../marks/loopMarks'
import { withoutCovered } from '../marks/withoutCovered'
import { gainWindow } from '../scales/gainWindow'
import type { AxisScale } from '../scales/AxisScale'
import { linearScale } from '../scales/linearScale'
import { linearTicks } from '../scales/linearTicks'
import { formatSounding, plainDistance } from '../text/formatSounding'
import { formatTick } from '../text/formatTick'
import { textWidth } from '../text/textWidth'
import { hasMargins } from '../text/markWords'

interface Plane {
  panel: Rectangle
  x: AxisScale
  y: AxisScale
}

type PlacedMark = LoopMark & FigureMark

const title = '|L|, dB'

/**
 * Gain over phase: the critical point at every odd multiple of 180 deg in sight, each with its shoals (lines of equal distance to -1) around it,
 * and L with frequencies along it. Vertical distance to a critical point is gain margin, horizontal distance phase margin.
 */
export const drawGainOverPhase: DrawFigure<LoopFigureData> = (pen, data, options) => {
  const { theme, width } = options
  const main = data.curves[0]
  const views = alignedViews(data.curves)
  const window = phaseWindow(views.map(view => view.phase))
  const keyHeight = drawCurveKey(pen, data.curves, 0, 0, width, theme)
  const height = options.height ?? Math.round(Math.min(width * 0.7, 560)) + keyHeight
  const size = theme.size.tick
  const left = size * 3.4
  const panel = { x: left, y: keyHeight + size + 10, width: width - left - 10, height: height - keyHeight - 3 * size - 26 }
  const gains = gainWindow(views.map(view => view.gain))
  const plane: Plane = {
    panel,
    x: linearScale(window.from, window.to, panel.x, panel.x + panel.width),
    y: linearScale(Math.max(gains.from, -60), Math.min(gains.to, 60), panel.y + panel.height, panel.y),
  }
  const field = new LabelField(panel)
  const criticals = criticalPlaces(plane)

  drawGround(pen, plane, criticals, data.requiredVectorMargin, options)
  drawStanding(pen, main.analysis, panel, title, theme)
  const isOverlaid = data.curves.length > 1
  const mainPlace = (sample: MeasuredSample) => samplePlace(sample, main, views[0]!.phase, window, plane)
  if (isOverlaid) drawSamples(pen, main.samples, mainPlace, panel, theme, true)
  let mainPieces: number[][] = []
  let mainShown = { xs: new Float64Array(0), ys: new Float64Array(0), shown: main, end: 0 }
  for (let index = data.curves.length - 1; index >= 0; index--) {
    const figureCurve = data.curves[index]!
    const end = windingStart(views[index]!.phase, views[index]!.gain.map(plane.y.toPixel), closestTurns)
    const wrapped = wrapPhase(figureCurve.curve.frequency, viewsUpTo(views[index]!, end), window)
    const shown: FigureCurve = { ...figureCurve, curve: { ...figureCurve.curve, frequency: wrapped.frequency } }
    const [xs, ys] = [wrapped.phase.map(plane.x.toPixel), wrapped.gain.map(plane.y.toPixel)]
    const pieces = drawCurve(pen, shown, curveStyle(data.curves, index, theme), xs, ys, panel)
    field.blockPolylines(pieces)
    if (index > 0) drawOtherSamples(pen, figureCurve.samples, index, sample => samplePlace(sample, figureCurve, views[index]!.phase, window, plane), panel, theme)
    else {
      mainPieces = pieces
      mainShown = { xs, ys, shown, end }
      drawWinding(pen, field, figureCurve, views[0]!, end, plane, options)
    }
  }
  if (!isOverlaid) drawSamples(pen, main.samples, mainPlace, panel, theme)

  const marks = placeMarks(main, views[0]!, data, window, plane)
  for (const { x, y } of marks) field.blockRectangle({ x: x - 6, y: y - 6, width: 12, height: 12 })
  blockGround(field, plane, criticals, data.requiredVectorMargin)
  for (const x of criticals) field.blockRectangle({ x: x - 7, y: plane.y.toPixel(0) - 7, width: 14, height: 14 })
  const shownMarks = withoutCovered(marks)
  for (const mark of marks) drawPlaneMark(pen, mark, shownMarks.has(mark), data, options)
  for (const x of criticals) {
    const y = plane.y.toPixel(0)
    pen.stroke(`M${tenth(x - 6)} ${tenth(y)}h12M${tenth(x)} ${tenth(y - 6)}v12`, theme.ink, 2)
    drawLabel(pen, field, [{ text: '−1', size: theme.size.label, fill: theme.ink, face: 'semibold' }], { x, y, gap: 13, reach: 40, prefer: 45 }, theme)
  }
  for (const mark of shownMarks) labelPlaneMark(pen, field, mark, data, options)
  drawDirection(pen, mainPieces, marks, theme)
  drawFrequencyMarks(pen, field, curveUpTo(main.curve, mainShown.end), views[0]!.phase.map(phase => plane.x.toPixel(shownPhase(phase, window))), views[0]!.gain.map(plane.y.toPixel), panel, theme)

  return {
    width,
    height,
    panels: [{ ...panel, xScale: plane.x, yScale: plane.y }],
    marks: marks.map(({ id, kind, label, x, y }) => ({ id, kind, label, x, y })),
    locate: (x, y) => {
      const frequency = nearestOnCurve(mainShown.shown.curve, mainShown.xs, mainShown.ys, x, y, 40)
      return frequency === null ? null : { frequency }
    },
    pointsAt: (frequency) => {
      const gain = valueOfView(main.curve, views[0]!.gain, frequency)
      const phase = valueOfView(main.curve, views[0]!.phase, frequency)
      return gain === null || phase === null ? [] : pointsInside([[plane.x.toPixel(shownPhase(phase, window)), plane.y.toPixel(gain), panel]])
    },
  }
}

/** px; turns closer than this are told by a band. */
const closestTurns = 2.5

function viewsUpTo({ gain, phase, distance }: CurveViews, end: number): CurveViews {
  return { gain: gain.subarray(0, end), phase: phase.subarray(0, end), distance: distance.subarray(0, end) }
}

/** The band of gain in which the curve winds on. */
function drawWinding(pen: Pen, field: LabelField, { curve }: FigureCurve, { gain }: CurveViews, end: number, { panel, y }: Plane, { theme }: FigureOptions): void {
  if (end >= gain.length) return
  const top = Math.max(panel.y, Math.min(y.toPixel(gain[end]!), y.toPixel(gain[gain.length - 1]!)))
  const bottom = Math.min(panel.y + panel.height, Math.max(y.toPixel(gain[end]!), y.toPixel(gain[gain.length - 1]!)))
  if (bottom <= top) return
  const band = { x: panel.x, y: top, width: panel.width, height: bottom - top }
  drawHatching(pen, band.x, band.x + band.width, band, theme)
  field.blockRectangle(band)
  const from = formatTick(Number(curve.frequency[end]!.toPrecision(2)))
  const size = theme.size.tick
  const text = `from ${from} on L winds in this band`
  const [right, baseline] = [panel.x + panel.width - 6, Math.min(bottom + size + 3, panel.y + panel.height - 4)]
  pen.text(text, right, baseline, { size, fill: theme.ink, anchor: 'end' })
  field.blockRectangle({ x: right - textWidth(text, size), y: baseline - size, width: textWidth(text, size), height: size + 3 })
}

function criticalPlaces({ x }: Plane): number[] {
  const places: number[] = []
  for (let angle = Math.ceil((x.from - 180) / 360) * 360 + 180; angle <= x.to; angle += 360) places.push(x.toPixel(angle))
  return places
}

function drawGround(pen: Pen, { panel, x, y }: Plane, criticals: number[], required: number | null, { theme }: FigureOptions): void {
  // The shoals of every critical point in sight, and of those just beyond the edges.
  const ground = pen.window(panel.x, panel.y, panel.width, panel.height)
  const turn = x.toPixel(360) - x.toPixel(0)
  const beyond = criticals.length > 0 ? [criticals[0]! - turn, ...criticals, criticals[criticals.length - 1]! + turn] : []
  const centres = beyond.filter(centre => centre > panel.x - turn / 4 && centre < panel.x + panel.width + turn / 4)
  shoalDistances(required).forEach((distance, i) => {
    const contour = distanceContour(distance, y.from - 20)
    const pieces = centres.map(centre => contour.flatMap(({ phase, gain }) => [centre + phase * turn / 360 - panel.x, y.toPixel(gain) - panel.y]))
    ground.fill(pathData(pieces, true), theme.shoal[Math.min(i, 2)]!)
    if (distance === required) ground.stroke(pathData(pieces, true), theme.ink, theme.stroke.mark, { 'stroke-dasharray': '5 3' })
  })
  const size = theme.size.tick
  const ticks = linearTicks(x.from, x.to, panel.width / (size * 4.5), [30, 45, 90, 180, 360])
  pen.stroke(ticks.map(value => `M${tenth(x.toPixel(value))} ${tenth(panel.y)}v${tenth(panel.height)}`).join(''), theme.rule, theme.stroke.hair)
  drawLevels(pen, y, linearTicks(y.from, y.to, panel.height / 26, [5, 10, 20, 40]), panel, title, theme)
  for (const value of ticks) pen.text(formatTick(value), x.toPixel(value), panel.y + panel.height + size + 5, { size, fill: theme.slate, anchor: 'middle' })
  pen.text('phase of L, deg', panel.x + panel.width, panel.y + panel.height + 2 * size + 9, { size, fill: theme.slate, anchor: 'end' })
  drawLevel(pen, y, 0, panel, theme.slate, theme.stroke.axis)
  pen.stroke(criticals.map(place => `M${tenth(place)} ${tenth(panel.y)}v${tenth(panel.height)}`).join(''), theme.slate, theme.stroke.axis)
}

/** Labels keep off the required ring, and rather off the axes. */
function blockGround(field: LabelField, { panel, x, y }: Plane, criticals: number[], required: number | null): void {
  const turn = x.toPixel(360) - x.toPixel(0)
  if (required !== null) {
    const contour = distanceContour(required, y.from - 20)
    field.blockPolylines(criticals.map(centre => contour.flatMap(({ phase, gain }) => [centre + phase * turn / 360, y.toPixel(gain)])))
  }
  field.blockPolylines([[panel.x, y.toPixel(0), panel.x + panel.width, y.toPixel(0)], ...criticals.map(at => [at, panel.y, at, panel.y + panel.height])], true)
}

function samplePlace(sample: MeasuredSample, curve: FigureCurve, phases: Float64Array, window: PhaseWindow, { x, y }: Plane): [number, number] {
  return [x.toPixel(shownPhase(samplePhase(sample, curve, phases), window)), y.toPixel(20 * Math.log10(Math.hypot(sample.re, sample.im)))]
}

function placeMarks(main: FigureCurve, views: CurveViews, data: LoopFigureData, window: PhaseWindow, { panel, x, y }: Plane): PlacedMark[] {
  const placed: PlacedMark[] = []
  for (const mark of loopMarks(main.analysis, data.frequencyUnit, data.requiredVectorMargin)) {
    if (typeof mark.frequency !== 'number') continue
    const gain = valueOfView(main.curve, views.gain, mark.frequency)
    const phase = valueOfView(main.curve, views.phase, mark.frequency)
    if (gain === null || phase === null) continue
    const [px, py] = [x.toPixel(shownPhase(phase, window)), y.toPixel(gain)]
    if (clipPolyline([px, px], [py, py], panel).length > 0) placed.push({ ...mark, x: px, y: py })
  }
  return placed
}

function drawPlaneMark(pen: Pen, mark: PlacedMark, shown: boolean, data: LoopFigureData, options: FigureOptions): void {
  const { theme } = options
  const group = markGroup(pen, mark, options)
  if (!shown) return
  if (mark.kind === 'gain') drawGainMark(group, mark.x, mark.y, mark.crossing.slope, theme)
  else if (mark.kind === 'phase') drawPhaseMark(group, mark.x, mark.y, theme, mark.faint)
  else drawApproachMark(group, mark.x, mark.y, mark.style, theme)
}

function labelPlaneMark(pen: Pen, field: LabelField, mark: PlacedMark, data: LoopFigureData, { theme }: FigureOptions): void {
  const { analysis } = data.curves[0]
  const { tick, label } = theme.size
  if (mark.kind === 'approach') {
    if (mark.crossing.distance > plainDistance || mark.style === 'faint') return
    drawLabel(pen, field, [{ text: formatSounding(mark.crossing.distance), size: label, fill: approachColour(mark.style, theme), face: 'semiboldItalic' }], { x: mark.x, y: mark.y, gap: 7, reach: 60, prefer: 20 }, theme, mark.style === 'nearest')
  }
  else if (hasMargins(analysis) && !(mark.kind === 'phase' && mark.faint)) {
    const text = mark.kind === 'gain' ? formatPhaseMargin(mark.crossing.phaseMargin) : formatGainMargin(mark.crossing.gainMargin)
    drawLabel(pen, field, [{ text, size: tick, fill: mark.kind === 'gain' ? theme.ink : theme.sea }], { x: mark.x, y: mark.y, gap: 7, reach: 40, prefer: 20 }, theme)
  }
}

function tenth(value: number): number {
  return Math.round(value * 10) / 10
}
