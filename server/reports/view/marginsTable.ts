import type { Criterion, CriterionRow } from '#shared/types/criterion'
import { formatFrequency } from '#shared/formatting/formatFrequency'
import type { PlacedCell } from './cellsOf'
import { conditionAnchor, loopAnchor } from './anchorOf'
import { limitOf, limitWords, marginFigure, marginKinds } from './criteriaWords'
import type { MarginKind } from './criteriaWords'
import type { TableView } from './ReportView'
import { tableOf } from './tableOf'
import type { CellDraft } from './tableOf'
import { verdictTone } from './verdictTone'

export const rowOfKind = (rows: readonly CriterionRow[], kind: Pick<MarginKind, 'quantity' | 'direction'>): CriterionRow | undefined =>
  rows.find(row => row.quantity === kind.quantity && row.direction === kind.direction)

function marginCell(cell: PlacedCell['cell'], kind: MarginKind): CellDraft {
  if (!cell.analysis || cell.analysis.summary === null) return { text: '' }
  const row = rowOfKind(cell.judgement.rows, kind)
  if (!row || row.value === null) return { text: 'none', tone: 'quiet' }
  const isFailing = row.verdict === 'not met' || row.verdict === 'not shown'
  const place = row.driver === null ? '' : `at ${formatFrequency(row.driver.frequency)}`
  return { text: marginFigure(kind.quantity, row.value), small: place, tone: isFailing ? verdictTone(row.verdict) : 'plain' }
}

/** The smallest margin of each kind of one loop in every condition, with its frequency, against the criteria. */
export function marginsTable(cells: readonly PlacedCell[], criteria: readonly Criterion[], unit: string): TableView {
  return tableOf({
    caption: `Smallest margins in every condition, and the frequency (${unit}) that sets each`,
    columns: [
      { head: 'condition', unit: 'required' },
      ...marginKinds.map(kind => ({
        head: `${kind.name}${kind.quantity === 'vectorMargin' ? '' : `, ${kind.unit}`}`,
        unit: limitWords(kind.quantity, limitOf(criteria, kind.quantity)).replace(/ (dB|deg|ms)$/, ''),
        isNumber: true,
      })),
      { head: 'verdict' },
    ],
    rows: cells.map(({ cell, loop, loopIndex, condition, conditionIndex }) => ({
      cells: [
        { text: condition.code, small: condition.name, isHead: true, target: conditionAnchor(loopAnchor(loopIndex, loop.code), conditionIndex) },
        ...marginKinds.map(kind => marginCell(cell, kind)),
        { text: cell.judgement.verdict, tone: verdictTone(cell.judgement.verdict) },
      ],
    })),
    notes: ['\u2018none\u2019: no crossing or approach sets a margin of that kind. Delays in ms. Where the closed loop is not shown to be stable there are no margins.'],
    kind: 'margins',
  })
}
