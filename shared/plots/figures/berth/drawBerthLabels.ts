import { formatDistance } from '../../../formatting/formatDistance'
import { formatFrequency } from '../../../formatting/formatFrequency'
import { formatGainMargin } from '../../../formatting/formatGainMargin'
import { formatPhaseMargin } from '../../../formatting/formatPhaseMargin'
import type { ListedFrequency, LoopAnalysis } from '../../../types/analysis'
import { shoalDistances } from '../../curves/shoalDistances'
import type { LoopFigureData } from '../../FigureData'
import type { LabelField } from '../../labels/LabelField'
import { approachColour } from '../../marks/approachStyle'
import type { LabelLine } from '../../marks/drawLabel'
import { drawLabel } from '../../marks/drawLabel'
import type { Pen } from '../../Pen'
import { formatSounding, plainDistance } from '../../text/formatSounding'
import { changeWords, hasMargins } from '../../text/markWords'
import type { PlotTheme } from '../../theme'
import type { Berth, BerthPlane, PlacedMark } from './BerthPlane'
import { isCompact } from './BerthPlane'

interface Labelled {
  plane: BerthPlane
  data: LoopFigureData
  marks: PlacedMark[]
  berth: Berth | null
  theme: PlotTheme
}

/** This many of the smallest margins are labelled before the frequencies along the curve, the others after. */
const firstMargins = 4

/**
 * Writes the labels of a berth chart, the most telling first, each where nothing is covered: the critical point, what is nearest to it, the rings,
 * the other approaches, the smallest margins, then frequencies along the curve (drawn by `frequencies`) and the other margins. A small chart has the
 * first ones only.
 */
export function drawBerthLabels(pen: Pen, field: LabelField, labelled: Labelled, frequencies: () => void): void {
  const { plane, data: { curves: [{ analysis }] }, marks, theme } = labelled
  const compact = isCompact(plane.panel)
  drawCriticalPoint(pen, field, plane, compact, theme)
  drawNearest(pen, field, labelled, compact)
  drawRings(pen, field, labelled, compact)
  drawSoundings(pen, field, compact ? marks.filter(mark => mark.kind === 'approach' && mark.style === 'under') : marks, theme)
  const crossings = bySmallestMargin(marks)
  drawMargins(pen, field, crossings.slice(0, compact ? 1 : firstMargins), analysis, theme)
  frequencies()
  if (!compact) drawMargins(pen, field, crossings.slice(firstMargins), analysis, theme)
}

function drawCriticalPoint(pen: Pen, field: LabelField, { x, y }: BerthPlane, compact: boolean, theme: PlotTheme): void {
  const [cx, cy] = [x.toPixel(-1), y.toPixel(0)].map(value => Math.round(value * 10) / 10) as [number, number]
  pen.stroke(`M${cx - 6} ${cy}h12M${cx} ${cy - 6}v12`, theme.ink, 2)
  const text = compact ? '−1' : 'critical point −1'
  drawLabel(pen, field, [{ text, size: theme.size.label, fill: theme.ink, face: 'semibold' }], { x: cx, y: cy, gap: 8, reach: 170, prefer: 135 }, theme)
}

function placeWords(frequency: ListedFrequency, data: LoopFigureData): string {
  if (frequency === 'infinity') return 'infinite frequency'
  return frequency === 0 ? 'zero frequency' : formatFrequency(frequency, data.frequencyUnit)
}

function drawNearest(pen: Pen, field: LabelField, { plane, data, berth, theme }: Labelled, compact: boolean): void {
  if (!berth) return
  const { analysis } = data.curves[0]
  const noun = analysis.stability.verdict === 'unstable' ? 'unstable: distance ' : berth.approach ? 'closest approach ' : 'least distance '
  const place = `${formatDistance(berth.distance)} at ${placeWords(berth.frequency, data)}`
  const lines: LabelLine[] = [{ text: compact ? place : noun + place, size: compact ? theme.size.label : theme.size.strong, fill: theme.magenta, face: 'semibold' }]
  if (berth.approach && hasMargins(analysis) && !compact) {
    lines.push({ text: 'one change that reaches −1:', size: theme.size.label, fill: theme.ink }, { text: changeWords(berth.approach), size: theme.size.label, fill: theme.ink })
  }
  drawLabel(pen, field, lines, { x: berth.x, y: berth.y, gap: 9, reach: 260, prefer: berth.y > plane.y.toPixel(0) ? -60 : 60 }, theme, true)
}

function drawRings(pen: Pen, field: LabelField, { plane: { x, y, unit }, data: { requiredVectorMargin: required }, theme }: Labelled, compact: boolean): void {
  const size = theme.size.tick
  for (const radius of shoalDistances(required)) {
    if (compact && radius !== required) continue
    const text = radius === required ? `${radius.toFixed(2)} required` : radius.toFixed(2)
    // Inside the ring, along its upper left where curves seldom run, then around.
    for (const angle of [90, 112, 68, 135, 157, 180, 45, 202, 225, 247, 270, 292, 315, 22]) {
      const [px, py] = [x.toPixel(-1) + Math.cos(angle * Math.PI / 180) * radius * unit, y.toPixel(0) - Math.sin(angle * Math.PI / 180) * radius * unit]
      if (drawLabel(pen, field, [{ text, size, fill: theme.ink }], { x: px, y: py, gap: 4, reach: 4, prefer: angle + 180 }, theme)) break
    }
  }
}

/** The distance at every closest approach but the nearest. */
function drawSoundings(pen: Pen, field: LabelField, marks: PlacedMark[], theme: PlotTheme): void {
  for (const mark of marks) {
    if (mark.kind !== 'approach' || mark.crossing.distance > plainDistance || mark.style === 'nearest' || mark.style === 'faint') continue
    drawLabel(pen, field, [{ text: formatSounding(mark.crossing.distance), size: theme.size.label, fill: approachColour(mark.style, theme), face: 'semiboldItalic' }],
      { x: mark.x, y: mark.y, gap: 7, reach: 30 }, theme, mark.style === 'under')
  }
}

/** Gain and phase crossovers, those of the smallest margin first: 6 dB weigh as much as 30 deg, by common practice. */
function bySmallestMargin(marks: PlacedMark[]): PlacedMark[] {
  const size = (mark: PlacedMark) => mark.kind === 'gain' ? Math.abs(mark.crossing.phaseMargin) / 30 : mark.kind === 'phase' ? Math.abs(mark.crossing.gainMargin) / 6 : Infinity
  return marks.filter(mark => mark.kind === 'gain' || (mark.kind === 'phase' && !mark.faint)).sort((a, b) => size(a) - size(b))
}

/** Margins at the crossings, in words, where there is room: the table has them all. Distances where the loop is not stable. */
function drawMargins(pen: Pen, field: LabelField, marks: PlacedMark[], analysis: LoopAnalysis, theme: PlotTheme): void {
  const margins = hasMargins(analysis)
  for (const mark of marks) {
    if (mark.kind === 'approach') continue
    const { distance } = mark.crossing
    const text = margins
      ? mark.kind === 'gain' ? formatPhaseMargin(mark.crossing.phaseMargin) : formatGainMargin(mark.crossing.gainMargin)
      : distance === undefined ? '' : formatSounding(distance)
    if (text) drawLabel(pen, field, [{ text, size: theme.size.tick, fill: mark.kind === 'phase' ? theme.sea : theme.ink }], { x: mark.x, y: mark.y, gap: 7, reach: 44, prefer: 30 }, theme)
  }
}
