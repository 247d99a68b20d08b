import { gainDecreaseCaution } from '#shared/formatting/gainDecreaseCaution'
import { formatDecibels } from '#shared/formatting/formatDecibels'
import { verdictOrder } from '#shared/analysis/criteria/verdictOrder'
import type { CriterionQuantity, CriterionRow, Verdict } from '#shared/types/criterion'
import type { BoardCell } from '#shared/types/system'
import { marginInWords } from './marginInWords'
import { quantityNames } from './quantityNames'

/** What one cell of the board shows of the quantity chosen. */
export interface BoardValue {
  /** the worst value with its direction, or why there is none */
  text: string
  /** verdict of that value */
  verdict: Verdict
  /** the verdict over all quantities, naming the quantity where it is another than the one shown: 'not met: phase' */
  standing: string
  overall: Verdict
  /** places along the bar, 0 to 1; null where there is nothing to draw */
  bar: { value: number, limit: number | null } | null
  /** value over limit, for sorting: the smaller the worse; null where either is missing */
  ratio: number | null
  /** crossings in words, null without an analysis */
  crossings: string | null
  /** what a reader must know of the lists: 'not proven', '2 untrusted gaps', null where every entry is proven */
  caution: string | null
  /** where falling gain reaches -1: briefly, and in full; null where it does not, or where the value shown says it */
  gainFall: { brief: string, full: string } | null
  /** why the verdict cannot be right beside that of another loop of the same closed system */
  disagreement: string | null
}

const rank = (verdict: Verdict) => verdictOrder.indexOf(verdict)
const ratioOf = (row: CriterionRow) => row.value === null || row.limit === null || row.limit === 0 ? null : row.value / row.limit

/** The row of a quantity that stands worst: by its verdict, then by how near its value is to the limit. */
function worstRow(rows: readonly CriterionRow[]): CriterionRow | null {
  let worst: CriterionRow | null = null
  for (const row of rows) {
    if (worst === null || rank(row.verdict) < rank(worst.verdict)
      || (rank(row.verdict) === rank(worst.verdict) && sizeOf(row) < sizeOf(worst))) worst = row
  }
  return worst
}

const sizeOf = (row: CriterionRow) => ratioOf(row) ?? row.value ?? Number.POSITIVE_INFINITY

function barOf(row: CriterionRow): BoardValue['bar'] {
  if (row.value === null) return null
  const span = row.quantity === 'vectorMargin' ? 1 : row.limit === null ? null : 2 * row.limit
  if (span === null || span === 0) return null
  return { value: Math.min(1, row.value / span), limit: row.limit === null ? null : Math.min(1, row.limit / span) }
}

function standingOf(cell: BoardCell, shown: CriterionRow | null): string {
  const { verdict, rows } = cell.judgement
  // The text says why already.
  if (cell.failure !== null) return ''
  if (shown === null || shown.verdict === verdict || !['not met', 'not shown'].includes(verdict)) return verdict
  const others = [...new Set(rows.filter(row => row.verdict === verdict).map(row => quantityNames[row.quantity].short))]
  return others.length === 0 ? verdict : `${verdict}: ${others.join(', ')}`
}

function cautionOf(cell: BoardCell): string | null {
  if (cell.analysis === null) return null
  const { proven, exceptions } = cell.analysis.coverage
  if (cell.source?.kind === 'measured' || cell.analysis.samples !== undefined) {
    if (exceptions.length === 0) return null
    return exceptions.length === 1 ? '1 untrusted gap' : `${exceptions.length} untrusted gaps`
  }
  return proven ? null : 'not proven'
}

function textOf(cell: BoardCell, shown: CriterionRow | null): string {
  if (cell.source === null) return 'no data'
  if (cell.failure !== null || cell.analysis === null) return 'cannot be analysed'
  if (cell.analysis.stability.verdict !== 'stable') return cell.analysis.stability.verdict
  return shown === null ? 'no limit' : marginInWords(shown)
}

function gainFallOf({ analysis }: BoardCell, shown: CriterionRow | null): BoardValue['gainFall'] {
  const decrease = analysis?.summary?.gainDecrease ?? null
  const full = gainDecreaseCaution(analysis?.summary ?? null)
  if (decrease === null || full === null || shown?.direction === 'fall') return null
  return { brief: `if gain falls: ${formatDecibels(decrease)} left`, full }
}

export function boardValue(cell: BoardCell, quantity: CriterionQuantity): BoardValue {
  const shown = worstRow(cell.judgement.rows.filter(row => row.quantity === quantity))
  const stable = cell.analysis?.stability.verdict === 'stable'
  return {
    text: textOf(cell, shown),
    verdict: shown !== null && stable ? shown.verdict : cell.judgement.verdict,
    standing: standingOf(cell, stable ? shown : null),
    overall: cell.judgement.verdict,
    bar: stable && shown !== null ? barOf(shown) : null,
    ratio: stable && shown !== null ? ratioOf(shown) : null,
    crossings: cell.analysis === null ? null : `${cell.analysis.gainCrossovers.length} gain · ${cell.analysis.phaseCrossovers.length} phase`,
    caution: cautionOf(cell),
    gainFall: gainFallOf(cell, stable ? shown : null),
    disagreement: cell.disagreement,
  }
}
