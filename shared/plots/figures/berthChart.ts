import type { DrawFigure, FigureMark, FigureOptions } from '../Figure'
import type { FigureCurve, LoopFigureData } from '../FigureData'
import type { Pen } from '../Pen'
import type { Rectangle } from '../curves/Rectangle'
import { formatDistance } from '../../formatting/formatDistance'
import { formatFrequency } from '../../formatting/formatFrequency'
import { formatGainMargin } from '../../formatting/formatGainMargin'
import { formatPhaseMargin } from '../../formatting/formatPhaseMargin'
import { circlePath } from '../curves/circlePath'
import { curveUpTo } from '../curves/curveUpTo'
import { curveViews } from '../curves/curveViews'
import { interpolateCurve } from '../curves/interpolateCurve'
import { nearestOnCurve } from '../curves/nearestOnCurve'
import { pointsInside } from '../curves/pointsInside'
import { shoalDistances } from '../curves/shoalDistances'
import { windingStart } from '../curves/windingStart'
import { LabelField } from '../labels/LabelField'
import { drawCurve } from '../marks/drawCurve'
import { drawCurveKey } from '../marks/drawCurveKey'
import { drawDirection, drawFrequencyMarks } from '../marks/drawFrequencyMarks'
import { drawLabel } from '../marks/drawLabel'
import { drawApproachMark, drawGainMark, drawPhaseMark, markGroup } from '../marks/drawMark'
import { drawStanding } from '../marks/drawStanding'
import type { LoopMark } from '../marks/loopMarks'
import { loopMarks, nearestApproach } from '../marks/loopMarks'
import { withoutCovered } from '../marks/withoutCovered'
import type { AxisScale } from '../scales/AxisScale'
import { linearScale } from '../scales/linearScale'
import { linearTicks } from '../scales/linearTicks'
import { changeWords, hasMargins } from '../text/markWords'
import { formatSounding, plainDistance } from '../text/formatSounding'
import { formatTick } from '../text/formatTick'
import type { PlotTheme } from '../theme'

/** Half the height of the neighbourhood of -1 that is shown, and its right edge: the same for every loop, so that loops compare at a glance. */
const halfHeight = 1.28
const rightEdge = 1.12

const imaginaryTitle = 'imaginary part of L'

interface Plane {
  x: AxisScale
  y: AxisScale
  panel: Rectangle
  /** px per unit of L */
  unit: number
}

/**
 * The berth chart: the neighbourhood of -1 in the plane of L, with rings at distances of the return difference as shoals, the required one dashed,
 * L as one line with frequencies along it, every crossing, and the closest approach as a line from -1 with what it stands for.
 */
export const drawBerthChart: DrawFigure<LoopFigureData> = (pen, data, options) => {
  const { theme, width } = options
  const keyHeight = drawCurveKey(pen, data.curves, 0, 0, width, theme)
  const plane = layOut(width, options.height ?? Math.round(Math.min(width * 0.74, 600)) + keyHeight, keyHeight, theme)
  const { panel } = plane
  const field = new LabelField(panel)
  const main = data.curves[0]

  drawGround(pen, plane, data.requiredVectorMargin, theme)
  drawStanding(pen, main.analysis, panel, theme)
  drawDiscs(pen, plane, main, theme)

  // The curves, the main one last so that it lies on top.
  let mainPieces: number[][] = []
  for (let index = data.curves.length - 1; index >= 0; index--) {
    const figureCurve = data.curves[index]!
    const { xs, ys } = project(figureCurve, plane)
    const end = windingEnd(figureCurve, plane)
    const pieces = drawCurve(pen, figureCurve, index, xs.subarray(0, end), ys.subarray(0, end), panel, theme)
    field.blockPolylines(pieces)
    if (index === 0) {
      mainPieces = pieces
      drawWinding(pen, field, figureCurve, end, plane, theme)
    }
  }
  const marks = placeMarks(main, data, plane)
  const berth = drawBerth(pen, plane, main, marks, data, theme)
  blockMarks(field, plane, marks, data.requiredVectorMargin, berth)
  const shown = withoutCovered(marks)
  for (const mark of marks) drawLoopMark(pen, mark, shown.has(mark), data, options)
  drawCriticalPoint(pen, field, plane, theme)
  drawNearestLabel(pen, field, marks, main, data, theme)
  drawRingLabels(pen, field, plane, data.requiredVectorMargin, theme)
  drawSoundings(pen, field, [...shown], main, data, theme)
  drawDirection(pen, mainPieces, marks, theme)
  const crossings = bySmallestMargin([...shown])
  drawMarginLabels(pen, field, crossings.slice(0, firstLabels), main, theme)
  const { xs, ys } = project(main, plane)
  drawFrequencyMarks(pen, field, curveUpTo(main.curve, windingEnd(main, plane)), xs, ys, panel, theme)
  drawMarginLabels(pen, field, crossings.slice(firstLabels), main, theme)

  return {
    width,
    height: panel.y + panel.height + theme.size.tick + 22,
    panels: [{ ...panel, xScale: plane.x, yScale: plane.y }],
    marks: marks.map(({ id, kind, label, x, y }) => ({ id, kind, label, x, y })),
    locate: (x, y) => {
      const frequency = nearestOnCurve(main.curve, xs, ys, x, y, 40)
      return frequency === null ? null : { frequency }
    },
    pointsAt: (frequency) => {
      const value = interpolateCurve(main.curve, frequency)
      return value ? pointsInside([[plane.x.toPixel(value.re), plane.y.toPixel(value.im), panel]]) : []
    },
  }
}

type PlacedMark = LoopMark & FigureMark

function layOut(width: number, height: number, top: number, theme: PlotTheme): Plane {
  const left = theme.size.tick * 3
  const above = theme.size.tick + 10
  const panel = { x: left, y: top + above, width: width - left - 2, height: height - top - above - theme.size.tick - 22 }
  const unit = panel.height / (2 * halfHeight)
  const spanX = panel.width / unit
  return {
    panel,
    unit,
    x: linearScale(rightEdge - spanX, rightEdge, panel.x, panel.x + panel.width),
    y: linearScale(-halfHeight, halfHeight, panel.y + panel.height, panel.y),
  }
}

function project({ curve }: FigureCurve, { x, y }: Plane): { xs: Float64Array, ys: Float64Array } {
  return { xs: curve.re.map(x.toPixel), ys: curve.im.map(y.toPixel) }
}

function drawGround(pen: Pen, { panel, x, y, unit }: Plane, required: number | null, theme: PlotTheme): void {
  const ground = pen.window(panel.x, panel.y, panel.width, panel.height)
  const [cx, cy] = [x.toPixel(-1) - panel.x, y.toPixel(0) - panel.y]
  const [ox] = [x.toPixel(0) - panel.x]
  const radii = shoalDistances(required)
  radii.forEach((radius, i) => ground.circle(cx, cy, radius * unit, { fill: theme.shoal[Math.min(i, 2)]! }))
  ground.stroke(`M0 ${tenth(cy)}H${tenth(panel.width)}M${tenth(ox)} 0V${tenth(panel.height)}`, theme.slate, theme.stroke.hair, { opacity: 0.6 })
  ground.stroke(circlePath(ox, cy, unit), theme.slate, theme.stroke.hair, { 'stroke-dasharray': '1 3', 'stroke-linecap': 'round' })
  if (required !== null) ground.stroke(circlePath(cx, cy, required * unit), theme.ink, theme.stroke.mark, { 'stroke-dasharray': '5 3' })
  pen.rect(panel.x, panel.y, panel.width, panel.height, { 'fill': 'none', 'stroke': theme.rule, 'stroke-width': theme.stroke.hair })

  const size = theme.size.tick
  const baseline = panel.y + panel.height + size + 5
  for (const value of linearTicks(x.from, x.to, 9, [0.5, 1])) pen.text(formatTick(value), x.toPixel(value), baseline, { size, fill: theme.slate, anchor: 'middle' })
  for (const value of linearTicks(y.from, y.to, 6, [0.5, 1])) pen.text(formatTick(value), panel.x - 6, y.toPixel(value) + size * 0.36, { size, fill: theme.slate, anchor: 'end' })
  pen.text('real part of L', panel.x + panel.width, baseline + size + 3, { size, fill: theme.slate, anchor: 'end' })
  pen.text(imaginaryTitle, panel.x, panel.y - 6, { size, fill: theme.slate })
}

/** px; turns closer than this are told by a disc. */
const closestTurns = 2.5

/** Number of samples up to where the curve winds about the origin too closely to be drawn. */
function windingEnd({ curve }: FigureCurve, { unit }: Plane): number {
  return windingStart(curveViews(curve).phase, curve.re.map((re, i) => Math.hypot(re, curve.im[i]!) * unit), closestTurns)
}

/** The disc in which the curve winds on. */
function drawWinding(pen: Pen, field: LabelField, { curve }: FigureCurve, end: number, { x, y, unit }: Plane, theme: PlotTheme): void {
  if (end >= curve.re.length) return
  const radius = Math.hypot(curve.re[end]!, curve.im[end]!) * unit
  if (radius < closestTurns) return
  const [cx, cy] = [x.toPixel(0), y.toPixel(0)]
  pen.circle(cx, cy, radius, { fill: theme.slate })
  field.blockCircle(cx, cy, radius)
  const from = formatTick(Number(curve.frequency[end]!.toPrecision(2)))
  drawLabel(pen, field, [{ text: `from ${from} on L winds in here`, size: theme.size.tick, fill: theme.ink }], { x: cx, y: cy, gap: radius + 8, reach: radius + 90, prefer: -45 }, theme)
}

/** Confidence discs of the measured samples, or their points. */
function drawDiscs(pen: Pen, { panel, x, y, unit }: Plane, main: FigureCurve, theme: PlotTheme): void {
  if (!main.samples) return
  const discs = pen.window(panel.x, panel.y, panel.width, panel.height)
  for (const { re, im, radius } of main.samples) {
    const [cx, cy] = [x.toPixel(re) - panel.x, y.toPixel(im) - panel.y]
    const r = (radius ?? 0) * unit
    if (cx < -r || cy < -r || cx > panel.width + r || cy > panel.height + r) continue
    if (r > 1.5 && r < panel.width) discs.circle(cx, cy, r, { 'fill': theme.slate, 'fill-opacity': 0.1, 'stroke': theme.slate, 'stroke-width': 0.5, 'stroke-opacity': 0.7 })
    discs.circle(cx, cy, 1.5, { fill: theme.slate })
  }
}

function placeMarks(main: FigureCurve, data: LoopFigureData, { x, y, panel }: Plane): PlacedMark[] {
  const placed: PlacedMark[] = []
  for (const mark of loopMarks(main.analysis, data.frequencyUnit)) {
    if (typeof mark.frequency !== 'number') continue
    const value = interpolateCurve(main.curve, mark.frequency)
    if (!value) continue
    const [px, py] = [x.toPixel(value.re), y.toPixel(value.im)]
    if (px >= panel.x && px <= panel.x + panel.width && py >= panel.y && py <= panel.y + panel.height) placed.push({ ...mark, x: px, y: py })
  }
  return placed
}

/** The line from -1 to the nearest of all approaches, and the circle about -1 that L only touches there. */
function drawBerth(pen: Pen, { panel, x, y, unit }: Plane, main: FigureCurve, marks: PlacedMark[], data: LoopFigureData, theme: PlotTheme): PlacedMark | null {
  const nearest = marks.find(mark => mark.id === `approach-${nearestApproach(main.analysis)}`)
  if (!nearest || nearest.kind !== 'approach') return null
  const [cx, cy] = [x.toPixel(-1), y.toPixel(0)]
  const window = pen.window(panel.x, panel.y, panel.width, panel.height)
  window.stroke(circlePath(cx - panel.x, cy - panel.y, nearest.crossing.distance * unit), theme.magenta, theme.stroke.mark)
  pen.stroke(`M${tenth(cx)} ${tenth(cy)}L${tenth(nearest.x)} ${tenth(nearest.y)}`, theme.magenta, theme.stroke.curve * 1.2)
  return nearest
}

function blockMarks(field: LabelField, { x, y, unit }: Plane, marks: PlacedMark[], required: number | null, berth: PlacedMark | null): void {
  const [cx, cy] = [x.toPixel(-1), y.toPixel(0)]
  for (const mark of marks) field.blockRectangle({ x: mark.x - 6, y: mark.y - 6, width: 12, height: 12 })
  field.blockRectangle({ x: cx - 7, y: cy - 7, width: 14, height: 14 })
  if (berth) field.blockPolylines([[cx, cy, berth.x, berth.y]])
  // Labels rather stand outside the innermost shoal and off the hairlines.
  field.blockCircle(cx, cy, (required ?? 0.5) * unit, true)
  const circle = (ox: number, radius: number) => Array.from({ length: 61 }, (_, i) => [ox + radius * Math.cos(i * Math.PI / 30), cy + radius * Math.sin(i * Math.PI / 30)]).flat()
  const lines = [circle(x.toPixel(0), unit), ...shoalDistances(required).map(radius => circle(cx, radius * unit))]
  field.blockPolylines([...lines, [x.toPixel(x.from), cy, x.toPixel(x.to), cy], [x.toPixel(0), y.toPixel(y.from), x.toPixel(0), y.toPixel(y.to)]], true)
  if (required !== null) field.blockPolylines([circle(cx, required * unit)])
  if (berth?.kind === 'approach') field.blockPolylines([circle(cx, berth.crossing.distance * unit)])
}

function drawLoopMark(pen: Pen, mark: PlacedMark, shown: boolean, data: LoopFigureData, options: FigureOptions): void {
  const { theme } = options
  const group = markGroup(pen, mark, options)
  if (!shown) return
  if (mark.kind === 'gain') drawGainMark(group, mark.x, mark.y, mark.crossing.slope, theme)
  else if (mark.kind === 'phase') drawPhaseMark(group, mark.x, mark.y, theme)
  else {
    const nearest = mark.id === `approach-${nearestApproach(data.curves[0].analysis)}`
    const under = data.requiredVectorMargin !== null && mark.crossing.distance < data.requiredVectorMargin
    drawApproachMark(group, mark.x, mark.y, nearest ? 'nearest' : under ? 'under' : 'clear', theme)
  }
}

function drawCriticalPoint(pen: Pen, field: LabelField, { x, y }: Plane, theme: PlotTheme): void {
  const [cx, cy] = [x.toPixel(-1), y.toPixel(0)]
  pen.stroke(`M${tenth(cx - 6)} ${tenth(cy)}H${tenth(cx + 6)}M${tenth(cx)} ${tenth(cy - 6)}V${tenth(cy + 6)}`, theme.ink, 2)
  drawLabel(pen, field, [{ text: 'critical point −1', size: theme.size.label, fill: theme.ink, face: 'semibold' }], { x: cx, y: cy, gap: 8, reach: 170, prefer: 135 }, theme)
}

function drawNearestLabel(pen: Pen, field: LabelField, marks: PlacedMark[], main: FigureCurve, data: LoopFigureData, theme: PlotTheme): void {
  const nearest = marks.find(mark => mark.id === `approach-${nearestApproach(main.analysis)}`)
  if (!nearest || nearest.kind !== 'approach') return
  const { label, strong } = theme.size
  const { crossing } = nearest
  const margins = hasMargins(main.analysis)
  const first = `${main.analysis.stability.verdict === 'unstable' ? 'unstable: distance' : 'closest approach'} ${formatDistance(crossing.distance)} at ${formatFrequency(crossing.frequency, data.frequencyUnit)}`
  const lines = [{ text: first, size: strong, fill: theme.magenta, face: 'semibold' as const }]
  const more = margins
    ? [{ text: 'one change that reaches −1:', size: label, fill: theme.ink }, { text: changeWords(crossing), size: label, fill: theme.ink }]
    : []
  drawLabel(pen, field, [...lines, ...more], { x: nearest.x, y: nearest.y, gap: 9, reach: 260, prefer: nearest.y > 0 ? -60 : 60 }, theme, true)
}

function drawRingLabels(pen: Pen, field: LabelField, { x, y, unit }: Plane, required: number | null, theme: PlotTheme): void {
  const size = theme.size.tick
  for (const radius of shoalDistances(required)) {
    const text = radius === required ? `${radius.toFixed(2)} required` : radius.toFixed(2)
    // Inside the ring, along its upper left where curves seldom run, then around.
    for (const angle of [90, 112, 68, 135, 157, 180, 45, 202, 225, 247, 270, 292, 315, 22]) {
      const [px, py] = [x.toPixel(-1) + Math.cos(angle * Math.PI / 180) * radius * unit, y.toPixel(0) - Math.sin(angle * Math.PI / 180) * radius * unit]
      if (drawLabel(pen, field, [{ text, size, fill: theme.ink }], { x: px, y: py, gap: 4, reach: 4, prefer: angle + 180 }, theme)) break
    }
  }
}

/** The distance at every closest approach but the nearest. */
function drawSoundings(pen: Pen, field: LabelField, marks: PlacedMark[], main: FigureCurve, data: LoopFigureData, theme: PlotTheme): void {
  for (const mark of marks) {
    if (mark.kind !== 'approach' || mark.crossing.distance > plainDistance || mark.id === `approach-${nearestApproach(main.analysis)}`) continue
    const under = data.requiredVectorMargin !== null && mark.crossing.distance < data.requiredVectorMargin
    drawLabel(pen, field, [{ text: formatSounding(mark.crossing.distance), size: theme.size.label, fill: under ? theme.unmet : theme.ink, face: 'semiboldItalic' }],
      { x: mark.x, y: mark.y, gap: 7, reach: 30 }, theme, under)
  }
}

/** The smallest margins are labelled before the frequencies along the curve, the others after. */
const firstLabels = 4

/** Gain and phase crossovers, those of the smallest margin first: 6 dB weigh as much as 30 deg, by common practice. */
function bySmallestMargin(marks: PlacedMark[]): PlacedMark[] {
  const size = (mark: PlacedMark) => mark.kind === 'gain' ? Math.abs(mark.crossing.phaseMargin) / 30 : mark.kind === 'phase' ? Math.abs(mark.crossing.gainMargin) / 6 : Infinity
  return marks.filter(mark => mark.kind !== 'approach').sort((a, b) => size(a) - size(b))
}

/** Margins at the crossings, in words, where there is room: the table has them all. */
function drawMarginLabels(pen: Pen, field: LabelField, marks: PlacedMark[], main: FigureCurve, theme: PlotTheme): void {
  const margins = hasMargins(main.analysis)
  for (const mark of marks) {
    if (mark.kind === 'approach') continue
    const distance = mark.crossing.distance
    const text = margins
      ? mark.kind === 'gain' ? formatPhaseMargin(mark.crossing.phaseMargin) : formatGainMargin(mark.crossing.gainMargin)
      : distance === undefined ? '' : formatSounding(distance)
    if (text) drawLabel(pen, field, [{ text, size: theme.size.tick, fill: mark.kind === 'phase' ? theme.sea : theme.ink }], { x: mark.x, y: mark.y, gap: 7, reach: 44, prefer: 30 }, theme)
  }
}

function tenth(value: number): number {
  return Math.round(value * 10) / 10
}
