import type { ReportSnapshot } from '#shared/types/snapshot'
import type { LoopGain } from '#shared/analysis/LoopGain'
import type { LoopInput } from '#shared/types/analysis'
import type { CurveSource } from '#shared/plots/buildLoopFigureData'
import { buildLoopFigureData } from '#shared/plots/buildLoopFigureData'
import { curveSourceOf } from '#shared/plots/curveSourceOf'
import type { FigureDataOf, FigureName } from '#shared/plots/figures'
import { figures } from '#shared/plots/figures'
import type { LoopFigureData } from '#shared/plots/FigureData'
import { nearestWords, stabilityWords } from '#shared/plots/captions/captionWords'
import { renderFigure } from '../../adapters/svgdom/renderFigure'
import { createNameGiver, fileNameOf } from '../package/fileNameOf'
import { safeHtml } from '../text/SafeHtml'
import type { PlacedCell } from '../view/cellsOf'
import { cellsOf } from '../view/cellsOf'
import { governingCell } from '../view/chapterView'
import { compareStanding } from '../view/compareStanding'
import { limitOf } from '../view/criteriaWords'
import { crossingChartData } from './crossingChartData'
import type { DrawnFigureView, DrawnReport } from './DrawnReport'
import { responseCsv } from './responseCsv'

export interface DrawOptions {
  /** a loop gain ready to be evaluated */
  prepareGain: (input: LoopInput) => LoopGain
  /** its continuous approximation, where it is a sampled controller on a continuous plant */
  approximateGain: (input: LoopInput) => LoopGain | null
  /** told before each loop: words, loops done, loops in all; drawing waits for it */
  progress: (step: string, done: number, total: number) => Promise<void>
  signal?: AbortSignal
}

/** px at 96 to the inch: the text's width on the page, and half of it less the gap. */
const fullWidth = 650
const halfWidth = 317

type LoopFigureName = Exclude<FigureName, 'crossingChart'>

/**
 * The large figures of a loop in the order they are printed, and their heights in px: the first is low enough to follow the tables of the
 * chapter's first page, the next two with their captions fill a page, and the last leaves room for two rows of small ones.
 */
const largeFigures = [
  { name: 'returnDifferenceProfile', height: 280 },
  { name: 'berthChart', height: 415 },
  { name: 'magnitudePhase', height: 415 },
  { name: 'gainOverPhase', height: 350 },
] as const
/** px; four rows with their captions fill a page */
const smallHeight = 180

/** Conditions beside the governing one that are drawn, the worst of them: beyond that a reader looks at the tables. */
const drawnOthers = 9

/** The caption of a small figure, whose large sister on an earlier page says how to read it. */
function shortCaption(name: LoopFigureName, { curves: [main], requiredVectorMargin, frequencyUnit }: LoopFigureData): string {
  const nearest = name === 'berthChart' ? ` ${stabilityWords(main.analysis)} ${nearestWords(main.analysis, requiredVectorMargin, frequencyUnit)}` : ''
  return `${main.name}: ${figures[name].title.toLowerCase()}.${nearest.replace(/ +/g, ' ')}`
}

/** Gives the event loop its turn: drawing is done in slices of one loop-condition pair. */
const breathe = () => new Promise<void>(resolve => setImmediate(resolve))

/** Pairs with an analysis and an input that can be drawn. */
interface DrawableCell extends PlacedCell {
  gain: LoopGain
  source: CurveSource
  /** the sources set aside, and the continuous approximation of a sampled loop */
  beside: CurveSource[]
}

function drawable(placed: PlacedCell, gain: LoopGain | null, { prepareGain, approximateGain }: Pick<DrawOptions, 'prepareGain' | 'approximateGain'>): DrawableCell | null {
  const { cell: { analysis, input, source, otherSources = [] }, condition } = placed
  if (!analysis || !input || !gain) return null
  const place = `${condition.code} ${condition.name}`
  const setAside = otherSources.flatMap(other => (other.input && other.analysis ? [curveSourceOf(other.name, other.input, other.analysis, prepareGain(other.input))] : []))
  const approximation = analysis.structure?.approximated ? approximateGain(input) : null
  return {
    ...placed,
    gain,
    source: curveSourceOf(setAside.length > 0 && source ? `${place}, ${source.name}` : place, input, analysis, gain),
    beside: [...setAside, ...(approximation ? [{ name: 'continuous approximation', analysis, gain: approximation, isApproximation: true }] : [])],
  }
}

/**
 * Draws every figure of a report from its frozen snapshot, in slices so that the server stays responsive: the crossing chart of the
 * condition that stands worst, and for each loop the large figures of its governing condition and small ones of the others.
 * The same snapshot gives the same bytes. Throws the signal's reason when aborted.
 */
export async function drawReportFigures(snapshot: ReportSnapshot, { prepareGain, approximateGain, progress, signal }: DrawOptions): Promise<DrawnReport> {
  const cells = cellsOf(snapshot)
  const required = limitOf(snapshot.criteria, 'vectorMargin')
  const unit = snapshot.system.frequencyUnit
  const figureName = createNameGiver()
  const responseName = createNameGiver()
  const drawn: DrawnReport = { crossingChart: null, loops: [], figures: [], responses: [] }
  const gains = new Map<PlacedCell, LoopGain | null>()

  function draw<Name extends FigureName>(name: Name, data: FigureDataOf[Name], id: string, fileStem: string, shape: { size: DrawnFigureView['size'], height?: number, caption?: string }): DrawnFigureView {
    const svg = renderFigure(name, data, { id, width: shape.size === 'full' ? fullWidth : halfWidth, ...(shape.height && { height: shape.height }) })
    drawn.figures.push({ name: figureName(`${fileStem}-${name}`, '.svg'), svg })
    return { drawing: safeHtml(svg), caption: shape.caption ?? figures[name].caption(data), size: shape.size }
  }

  for (const [loopIndex, loop] of snapshot.loops.entries()) {
    signal?.throwIfAborted()
    await progress(`Drawing ${loop.code} ${loop.name} (${loopIndex + 1} of ${snapshot.loops.length})`, loopIndex, snapshot.loops.length)
    const ofLoop = cells.filter(cell => cell.loopIndex === loopIndex)
    const sources: DrawableCell[] = []
    for (const placed of ofLoop) {
      const gain = placed.cell.input && placed.cell.analysis ? prepareGain(placed.cell.input) : null
      gains.set(placed, gain)
      const found = drawable(placed, gain, { prepareGain, approximateGain })
      if (found) sources.push(found)
      await breathe()
    }
    const stemOf = ({ condition }: PlacedCell) => `${fileNameOf(loop.code)}-${fileNameOf(condition.code)}`
    const title = `${loop.code} ${loop.name}`
    const main = governingCell(ofLoop)
    const governing = sources.find(({ conditionIndex }) => conditionIndex === main?.conditionIndex)
    const figuresOfLoop: DrawnReport['loops'][number] = { governing: [], others: [], leftOut: 0 }

    const others = sources.filter(cell => cell !== governing).sort((a, b) => compareStanding(a.cell, b.cell))
    const isDrawn = new Set(others.slice(0, drawnOthers))
    figuresOfLoop.leftOut = others.length - isDrawn.size

    for (const cell of sources) {
      const isGoverning = cell === governing
      const data = buildLoopFigureData({ title, requiredVectorMargin: required, curves: [cell.source, ...(isGoverning ? cell.beside : [])] })
      const idOf = (name: LoopFigureName) => `figure-${loopIndex + 1}-${cell.conditionIndex + 1}-${name}`
      const input = cell.cell.input
      if (input) drawn.responses.push({ name: responseName(stemOf(cell), '.csv'), csv: responseCsv(input, data.curves[0].curve, unit) })
      if (isGoverning) {
        for (const { name, height } of largeFigures) {
          figuresOfLoop.governing.push(draw(name, data, idOf(name), stemOf(cell), { size: 'full', height }))
          await breathe()
        }
      }
      else if (isDrawn.has(cell)) {
        for (const name of ['berthChart', 'returnDifferenceProfile'] as const) {
          figuresOfLoop.others.push(draw(name, data, idOf(name), stemOf(cell), { size: 'half', height: smallHeight, caption: shortCaption(name, data) }))
        }
        await breathe()
      }
      signal?.throwIfAborted()
    }
    drawn.loops.push(figuresOfLoop)
  }

  const worst = [...cells].sort((a, b) => compareStanding(a.cell, b.cell))[0]
  if (worst) {
    const ofCondition = cells.filter(cell => cell.conditionIndex === worst.conditionIndex)
    const data = crossingChartData(ofCondition, ofCondition.map(cell => gains.get(cell) ?? null), unit, required)
    drawn.crossingChart = draw('crossingChart', data, 'figure-crossing-chart', fileNameOf(worst.condition.code), {
      size: 'full',
      caption: `Where every loop crosses in ${data.condition}, the condition that holds the worst pair. Each edge of a bar is a gain crossover, each number the distance to \u22121 at a closest approach.`,
    })
  }
  return drawn
}
