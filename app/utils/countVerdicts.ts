import { verdictOrder } from '#shared/analysis/criteria/verdictOrder'
import type { Verdict } from '#shared/types/criterion'
import type { BoardCell } from '#shared/types/system'

/** How often each verdict occurs, worst first, without those that do not. */
export function countVerdicts(cells: readonly BoardCell[]): { verdict: Verdict, count: number }[] {
  return verdictOrder
    .map(verdict => ({ verdict, count: cells.filter(cell => cell.judgement.verdict === verdict).length }))
    .filter(entry => entry.count > 0)
}
