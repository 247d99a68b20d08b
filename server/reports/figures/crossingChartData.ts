import type { Verdict } from '#shared/types/criterion'
import type { LoopGain } from '#shared/analysis/LoopGain'
import type { CrossingChartData, CrossingChartRow, RowStanding } from '#shared/plots/FigureData'
import type { FrequencyUnit } from '#shared/types/analysis'
import { chooseFrequencyRange } from '#shared/plots/sampling/chooseFrequencyRange'
import type { PlacedCell } from '../view/cellsOf'

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

function verdictWords({ cell: { analysis, judgement } }: PlacedCell): string {
  const closedLoop = analysis?.stability.verdict
  return closedLoop === undefined || closedLoop === judgement.verdict ? judgement.verdict : `${closedLoop}, ${judgement.verdict}`
}

function isAboveOne(gain: LoopGain | null, w: number): boolean {
  const value = new Float64Array(2)
  return gain !== null && gain.evaluate(Math.max(w, gain.axisStart), value) && Math.hypot(value[0] ?? 0, value[1] ?? 0) > 1
}

/** The crossing chart of one condition: every loop in order, over a range that shows all their crossings. `gains` by place of the loop. */
export function crossingChartData(cells: readonly PlacedCell[], gains: readonly (LoopGain | null)[], frequencyUnit: FrequencyUnit, requiredVectorMargin: number | null): CrossingChartData {
  const radians = frequencyUnit === 'Hz' ? 2 * Math.PI : 1
  const ranges = cells.flatMap(({ cell: { analysis } }, index) => {
    const gain = gains[index]
    return analysis && gain ? [chooseFrequencyRange(analysis, gain)] : []
  })
  const range = {
    from: Math.min(...ranges.map(({ from }) => from), Infinity),
    to: Math.max(...ranges.map(({ to }) => to), 0),
  }
  const shown = ranges.length === 0 ? { from: 0.1, to: 100 } : range
  const rows = cells.map((placed, index): CrossingChartRow => {
    const { cell: { analysis }, loop } = placed
    const gain = gains[index] ?? null
    const hasEnds = gain !== null && (gain.axisStart > 0 || Number.isFinite(gain.axisEnd))
    return {
      key: loop.code,
      code: loop.code,
      name: loop.name,
      verdict: verdictWords(placed),
      standing: standings[placed.cell.judgement.verdict],
      requiredVectorMargin,
      analysis,
      gainAboveOne: isAboveOne(gain, shown.from * radians),
      ...(hasEnds && { band: { from: Math.max(gain.axisStart / radians, shown.from), to: Math.min(gain.axisEnd / radians, shown.to) } }),
    }
  })
  return { condition: cells[0] ? `${cells[0].condition.code} ${cells[0].condition.name}` : '', frequencyUnit, range: shown, rows }
}
