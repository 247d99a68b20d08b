import { verdictOrder } from '#shared/analysis/criteria/verdictOrder'
import type { CriterionQuantity, CriterionRow } from '#shared/types/criterion'
import type { BlockEffect, EffectSide } from '#shared/types/structure'
import { marginInWords } from './marginInWords'

/** A margin of a loop before and after a change, in words; the same twice where it stays. */
export interface MarginMove {
  quantity: CriterionQuantity
  before: string
  after: string
}

const quantities: readonly CriterionQuantity[] = ['vectorMargin', 'gainMargin', 'phaseMargin', 'delayMargin']
const rank = (row: CriterionRow) => verdictOrder.indexOf(row.verdict)
const sizeOf = (row: CriterionRow) => row.value === null ? Number.POSITIVE_INFINITY : row.value / (row.limit || 1)

/** The verdict of one side, or why it has none. */
export const verdictOf = (side: EffectSide | null): string => side === null ? 'no data' : side.failure !== null ? 'cannot be analysed' : side.judgement.verdict

/** The four margins of one loop in one condition before and after, each by its direction that stands worst. */
export function marginMoves({ before, after }: Pick<BlockEffect, 'before' | 'after'>): MarginMove[] {
  return quantities.map(quantity => ({ quantity, before: marginOf(before, quantity), after: marginOf(after, quantity) }))
}

function marginOf(side: EffectSide | null, quantity: CriterionQuantity): string {
  if (side === null || side.failure !== null || side.verdict !== 'stable') return 'none'
  const [worst] = side.judgement.rows.filter(row => row.quantity === quantity).sort((a, b) => rank(a) - rank(b) || sizeOf(a) - sizeOf(b))
  return worst === undefined ? 'none' : marginInWords(worst)
}

/** Effects that move anything, the worst outcome first: by the verdict after, then by the vector margin after; the first of them is the worst. */
export function movedWorstFirst(effects: readonly BlockEffect[]): BlockEffect[] {
  const outcome = ({ after }: BlockEffect) => after === null || after.failure !== null ? -1 : verdictOrder.indexOf(after.judgement.verdict)
  const distance = ({ after }: BlockEffect) => after?.vectorMargin?.distance ?? 0
  return effects.filter(effect => effect.moved).sort((a, b) => outcome(a) - outcome(b) || distance(a) - distance(b))
}
