import type { CrossingChartData, CrossingChartRow, RowStanding } from '#shared/plots/FigureData'
import type { LoopAnalysis } from '#shared/types/analysis'
import type { Verdict } from '#shared/types/criterion'
import type { BoardCell, Loop, OperatingCondition, System } from '#shared/types/system'
import { listCrossings } from './listCrossings'

const standings: Record<Verdict, RowStanding> = {
  'unstable': 'unstable',
  'not met': 'not met',
  'not shown': 'not shown',
  'no data': 'no data',
  'not met, accepted by deviation': 'accepted',
  'met': 'met',
  'met, no limit': 'met',
  'not applicable': 'not applicable',
}

/** Whether |L| > 1 over the whole axis of a loop without gain crossovers, as far as its lists tell. */
function isAboveOne({ phaseCrossovers, closestApproaches }: LoopAnalysis): boolean {
  return phaseCrossovers.some(crossover => crossover.gainMargin < 0) || closestApproaches.some(approach => approach.gainChange < 0)
}

function verdictOf({ analysis, failure, judgement }: BoardCell): string {
  if (failure !== null) return 'cannot be analysed'
  const closedLoop = analysis?.stability.verdict
  return closedLoop === undefined || closedLoop === judgement.verdict ? judgement.verdict : `${closedLoop}, ${judgement.verdict}`
}

/** Half a decade beyond the outermost crossings. */
function rangeOf(analyses: readonly LoopAnalysis[]): { from: number, to: number } {
  const frequencies = analyses.flatMap(listCrossings).flatMap(({ frequency }) => typeof frequency === 'number' && frequency > 0 ? [frequency] : [])
  if (frequencies.length === 0) return { from: 0.1, to: 100 }
  // No axis goes beyond where every loop ends: pi/T of sampled loops, the last sample of measured ones.
  const ends = analyses.map(({ coverage }) => coverage.to === 'infinity' ? Number.POSITIVE_INFINITY : coverage.to)
  return { from: Math.min(...frequencies) / Math.sqrt(10), to: Math.min(Math.max(...ends), Math.max(...frequencies) * Math.sqrt(10)) }
}

/** The crossing chart of one condition from the board's analyses alone, loops in the order given. */
export function boardCrossings(system: System, condition: OperatingCondition, loops: readonly Loop[], cells: readonly BoardCell[], requiredVectorMargin: number | null): CrossingChartData {
  const placed = loops.map(loop => ({ loop, cell: cells.find(cell => cell.loopId === loop.id && cell.conditionId === condition.id) ?? null }))
  const range = rangeOf(placed.flatMap(({ cell }) => cell?.analysis ?? []))
  const rows = placed.map(({ loop, cell }): CrossingChartRow => {
    const analysis = cell?.analysis ?? null
    const bounded = analysis !== null && (analysis.coverage.from > 0 || analysis.coverage.to !== 'infinity')
    return {
      key: loop.code,
      code: loop.code,
      name: loop.name,
      verdict: cell === null ? 'no data' : verdictOf(cell),
      standing: cell === null ? 'no data' : standings[cell.judgement.verdict],
      requiredVectorMargin,
      analysis,
      gainAboveOne: analysis !== null && isAboveOne(analysis),
      ...bounded && {
        band: { from: Math.max(range.from, analysis.coverage.from), to: analysis.coverage.to === 'infinity' ? range.to : Math.min(range.to, analysis.coverage.to) },
      },
    }
  })
  return { condition: `${condition.code} ${condition.name}`, frequencyUnit: system.frequencyUnit, range, rows }
}
