import type { MarginsThere } from '#shared/types/structure'
import type { CriterionRow } from '#shared/types/criterion'
import { closedLoopInWords } from './closedLoopInWords'
import { marginInWords } from './marginInWords'

/** One margin that a table shows, as judged: with its direction where it has one. */
export type ShownMargin = Pick<CriterionRow, 'quantity' | 'direction'>

/** The value of a margin, in the sign of its size; null where no crossing limits it or there are no margins. */
export function valueThere({ verdict, failure, summary, vectorMargin }: MarginsThere, { quantity, direction }: ShownMargin): number | null {
  if (failure !== null || verdict !== 'stable' || summary === null) return null
  if (quantity === 'vectorMargin') return vectorMargin?.distance ?? null
  if (quantity === 'delayMargin') return summary.delay
  const signed = quantity === 'gainMargin'
    ? direction === 'fall' ? summary.gainDecrease : summary.gainIncrease
    : direction === 'lead' ? summary.phaseLead : summary.phaseLag
  return signed === null ? null : Math.abs(signed)
}

/** The margin in words, or why there is none: 'unstable', 'cannot be analysed'. */
export function marginThere(there: MarginsThere, shown: ShownMargin): string {
  if (there.failure !== null) return 'cannot be analysed'
  if (there.verdict !== 'stable') return closedLoopInWords(there)
  return marginInWords({ quantity: shown.quantity, direction: null, value: valueThere(there, shown) })
}
