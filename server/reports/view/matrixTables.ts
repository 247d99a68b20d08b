import type { ReportSnapshot } from '#shared/types/snapshot'
import { formatDistance } from '#shared/formatting/formatDistance'
import type { PlacedCell } from './cellsOf'
import { conditionAnchor, loopAnchor } from './anchorOf'
import { limitOf, marginKinds } from './criteriaWords'
import { marginBar } from './marginBar'
import { rowOfKind } from './marginsTable'
import type { TableView } from './ReportView'
import { tableOf } from './tableOf'
import type { CellDraft } from './tableOf'
import { verdictTone } from './verdictTone'

/** Conditions that stand side by side on one page. */
const conditionsPerTable = 5

/** What a pair falls short in, in a word or two each. */
function shortfall({ cell }: PlacedCell): string {
  const failing = marginKinds.filter(kind => rowOfKind(cell.judgement.rows, kind)?.verdict === 'not met')
  return failing.map(kind => kind.name).join(', ')
}

function crossingCount({ cell: { analysis, source } }: PlacedCell): string {
  if (!analysis) return ''
  const unproven = !analysis.coverage.proven && source?.kind !== 'measured' ? ' \u00b7 not proven' : ''
  return `${analysis.gainCrossovers.length} gain \u00b7 ${analysis.phaseCrossovers.length} phase${unproven}`
}

function matrixCell(placed: PlacedCell, limit: number | null): CellDraft {
  const { cell, loop, loopIndex, conditionIndex } = placed
  const target = conditionAnchor(loopAnchor(loopIndex, loop.code), conditionIndex)
  const tone = verdictTone(cell.judgement.verdict)
  const distance = cell.analysis?.summary ? cell.analysis.vectorMargin?.distance ?? null : null
  const short = shortfall(placed)
  const verdict = short === '' ? cell.judgement.verdict : `${cell.judgement.verdict}: ${short}`
  if (distance === null) {
    return { text: cell.judgement.verdict, small: crossingCount(placed), tone, target }
  }
  return { text: formatDistance(distance), drawing: marginBar(distance, limit, tone), small: `${crossingCount(placed)}\n${verdict}`, tone, target }
}

/** Every loop in every condition: the vector margin, how it stands to its limit, how many crossings, and the verdict in words. */
export function matrixTables(snapshot: ReportSnapshot, cells: readonly PlacedCell[]): TableView[] {
  const limit = limitOf(snapshot.criteria, 'vectorMargin')
  const tables: TableView[] = []
  for (let from = 0; from < snapshot.conditions.length; from += conditionsPerTable) {
    const conditions = snapshot.conditions.slice(from, from + conditionsPerTable)
    const part = snapshot.conditions.length > conditionsPerTable ? `, conditions ${from + 1} to ${from + conditions.length} of ${snapshot.conditions.length}` : ''
    tables.push(tableOf({
      caption: `Vector margin of every loop in every condition${part}`,
      columns: [{ head: 'loop' }, ...conditions.map(condition => ({ head: condition.code, unit: condition.name }))],
      rows: snapshot.loops.map((loop, loopIndex) => ({
        cells: [
          { text: loop.code, small: loop.name, isHead: true, target: loopAnchor(loopIndex, loop.code) },
          ...conditions.map((_, offset) => {
            const placed = cells.find(cell => cell.loopIndex === loopIndex && cell.conditionIndex === from + offset)
            return placed ? matrixCell(placed, limit) : { text: '' }
          }),
        ],
      })),
      notes: [],
      kind: 'matrix',
    }))
  }
  return tables
}
