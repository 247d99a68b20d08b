import type { DrawFigure, FigureOptions } from '../Figure'
import type { FigureCurve, LoopFigureData } from '../FigureData'
import type { Pen } from '../Pen'
import { circlePath } from '../curves/circlePath'
import { curveStyle } from '../curves/curveStyle'
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
import { drawOtherSamples } from '../marks/drawSamples'
import { drawStanding } from '../marks/drawStanding'
import { loopMarks } from '../marks/loopMarks'
import { withoutCovered } from '../marks/withoutCovered'
import { nearestEnd } from '../marks/nearestEnd'
import { linearScale } from '../scales/linearScale'
import { linearTicks } from '../scales/linearTicks'
import { formatTick } from '../text/formatTick'
import type { PlotTheme } from '../theme'
import type { Berth, BerthPlane, PlacedMark } from './berth/BerthPlane'
import { isCompact } from './berth/BerthPlane'
import { drawBerthLabels } from './berth/drawBerthLabels'

/** Half the height of the neighbourhood of -1 that is shown, and its right edge: the same for every loop, so that loops compare at a glance. */
const halfHeight = 1.28
const rightEdge = 1.12

const imaginaryTitle = 'imaginary part of L'

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
  drawStanding(pen, main.analysis, panel, imaginaryTitle, theme)
  drawDiscs(pen, plane, main, theme)

  // The curves, the main one last so that it lies on top.
  let mainPieces: number[][] = []
  for (let index = data.curves.length - 1; index >= 0; index--) {
    const figureCurve = data.curves[index]!
    const { xs, ys } = project(figureCurve, plane)
    const end = windingEnd(figureCurve, plane)
    const pieces = drawCurve(pen, figureCurve, curveStyle(data.curves, index, theme), xs.subarray(0, end), ys.subarray(0, end), panel)
    field.blockPolylines(pieces)
    if (index > 0) drawOtherSamples(pen, figureCurve.samples, index, ({ re, im }) => [plane.x.toPixel(re), plane.y.toPixel(im)], panel, theme)
    else {
      mainPieces = pieces
      drawWinding(pen, field, figureCurve, end, plane, theme)
    }
  }
  const marks = placeMarks(main, data, plane)
  const berth = findBerth(main, marks, plane)
  if (berth) drawBerth(pen, plane, berth, theme)
  blockMarks(field, plane, marks, data.requiredVectorMargin, berth)
  const shown = withoutCovered(marks)
  for (const mark of marks) drawLoopMark(pen, mark, shown.has(mark), options)
  const { xs, ys } = project(main, plane)
  drawDirection(pen, mainPieces, marks, theme)
  const wound = curveUpTo(main.curve, windingEnd(main, plane))
  drawBerthLabels(pen, field, { plane, data, marks: [...shown], berth, theme }, () => drawFrequencyMarks(pen, field, wound, xs, ys, panel, theme))

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

function layOut(width: number, height: number, top: number, theme: PlotTheme): BerthPlane {
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

function project({ curve }: FigureCurve, { x, y }: BerthPlane): { xs: Float64Array, ys: Float64Array } {
  return { xs: curve.re.map(x.toPixel), ys: curve.im.map(y.toPixel) }
}

function drawGround(pen: Pen, { panel, x, y, unit }: BerthPlane, required: number | null, theme: PlotTheme): void {
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
function windingEnd({ curve }: FigureCurve, { unit }: BerthPlane): number {
  return windingStart(curveViews(curve).phase, curve.re.map((re, i) => Math.hypot(re, curve.im[i]!) * unit), closestTurns)
}

/** The disc in which the curve winds on. */
function drawWinding(pen: Pen, field: LabelField, { curve }: FigureCurve, end: number, { panel, x, y, unit }: BerthPlane, theme: PlotTheme): void {
  if (end >= curve.re.length) return
  const radius = Math.hypot(curve.re[end]!, curve.im[end]!) * unit
  if (radius < closestTurns) return
  const [cx, cy] = [x.toPixel(0), y.toPixel(0)]
  pen.circle(cx, cy, radius, { fill: theme.slate })
  field.blockCircle(cx, cy, radius)
  if (isCompact(panel)) return
  const from = formatTick(Number(curve.frequency[end]!.toPrecision(2)))
  drawLabel(pen, field, [{ text: `from ${from} on L winds in here`, size: theme.size.tick, fill: theme.ink }], { x: cx, y: cy, gap: radius + 8, reach: radius + 90, prefer: -45 }, theme)
}

/** Confidence discs of the measured samples, or their points. */
function drawDiscs(pen: Pen, { panel, x, y, unit }: BerthPlane, main: FigureCurve, theme: PlotTheme): void {
  if (!main.samples) return
  const discs = pen.window(panel.x, panel.y, panel.width, panel.height)
  for (const { re, im, radius } of main.samples) {
    const [cx, cy] = [x.toPixel(re) - panel.x, y.toPixel(im) - panel.y]
    const r = (radius ?? 0) * unit
    if (cx < -r || cy < -r || cx > panel.width + r || cy > panel.height + r) continue
    if (r > 1.5 && r < panel.width) discs.circle(cx, cy, r, { 'fill': theme.slate, 'fill-opacity': 0.07, 'stroke': theme.slate, 'stroke-width': 0.5, 'stroke-opacity': 0.4 })
    discs.circle(cx, cy, 1.5, { fill: theme.slate })
  }
}

function placeMarks(main: FigureCurve, data: LoopFigureData, { x, y, panel }: BerthPlane): PlacedMark[] {
  const placed: PlacedMark[] = []
  for (const mark of loopMarks(main.analysis, data.frequencyUnit, data.requiredVectorMargin)) {
    if (typeof mark.frequency !== 'number') continue
    const value = interpolateCurve(main.curve, mark.frequency)
    if (!value) continue
    const [px, py] = [x.toPixel(value.re), y.toPixel(value.im)]
    if (px >= panel.x && px <= panel.x + panel.width && py >= panel.y && py <= panel.y + panel.height) placed.push({ ...mark, x: px, y: py })
  }
  return placed
}

/** What is nearest to -1: the nearest of the approaches in sight, or an end of the axis that is nearer. */
function findBerth({ curve, analysis }: FigureCurve, marks: PlacedMark[], { x, y }: BerthPlane): Berth | null {
  const end = nearestEnd(analysis)
  if (end) {
    const last = curve.frequency.length - 1
    const place = end.frequency === 0 ? { re: curve.re[0]!, im: curve.im[0]! } : end.frequency === 'infinity' ? { re: curve.re[last]!, im: curve.im[last]! } : interpolateCurve(curve, end.frequency)
    return place && Number.isFinite(place.re) ? { x: x.toPixel(place.re), y: y.toPixel(place.im), distance: end.distance, frequency: end.frequency, approach: null } : null
  }
  for (const mark of marks) {
    if (mark.kind === 'approach' && mark.style === 'nearest') return { x: mark.x, y: mark.y, distance: mark.crossing.distance, frequency: mark.crossing.frequency, approach: mark.crossing }
  }
  return null
}

/** The line from -1 to what is nearest, and the circle about -1 that L only touches there. */
function drawBerth(pen: Pen, { panel, x, y, unit }: BerthPlane, berth: Berth, theme: PlotTheme): void {
  const [cx, cy] = [x.toPixel(-1), y.toPixel(0)]
  const window = pen.window(panel.x, panel.y, panel.width, panel.height)
  window.stroke(circlePath(cx - panel.x, cy - panel.y, berth.distance * unit), theme.magenta, theme.stroke.mark)
  pen.stroke(`M${tenth(cx)} ${tenth(cy)}L${tenth(berth.x)} ${tenth(berth.y)}`, theme.magenta, theme.stroke.curve * 1.2)
  if (!berth.approach) drawApproachMark(pen, berth.x, berth.y, 'nearest', theme)
}

function blockMarks(field: LabelField, { x, y, unit }: BerthPlane, marks: PlacedMark[], required: number | null, berth: Berth | null): void {
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
  if (berth) field.blockPolylines([circle(cx, berth.distance * unit)])
}

function drawLoopMark(pen: Pen, mark: PlacedMark, shown: boolean, options: FigureOptions): void {
  const { theme } = options
  const group = markGroup(pen, mark, options)
  if (!shown) return
  if (mark.kind === 'gain') drawGainMark(group, mark.x, mark.y, mark.crossing.slope, theme)
  else if (mark.kind === 'phase') drawPhaseMark(group, mark.x, mark.y, theme, mark.faint)
  else drawApproachMark(group, mark.x, mark.y, mark.style, theme)
}

function tenth(value: number): number {
  return Math.round(value * 10) / 10
}
