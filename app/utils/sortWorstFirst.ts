import { verdictOrder } from '#shared/analysis/criteria/verdictOrder'
import type { CriterionQuantity } from '#shared/types/criterion'
import type { BoardCell, Loop } from '#shared/types/system'
import { boardValue } from './boardValue'

/** Loops with the worst first: by the worst verdict over the conditions, then by the smallest value of the quantity against its limit. */
export function sortWorstFirst(loops: readonly Loop[], cells: readonly BoardCell[], quantity: CriterionQuantity): Loop[] {
  const key = (loop: Loop) => {
    const values = cells.filter(cell => cell.loopId === loop.id).map(cell => boardValue(cell, quantity))
    return {
      verdict: Math.min(verdictOrder.length, ...values.map(value => verdictOrder.indexOf(value.overall))),
      ratio: Math.min(Number.MAX_VALUE, ...values.flatMap(value => value.ratio === null ? [] : [value.ratio])),
    }
  }
  const keyed = loops.map(loop => ({ loop, ...key(loop) }))
  return keyed.sort((a, b) => a.verdict - b.verdict || a.ratio - b.ratio || a.loop.position - b.loop.position).map(entry => entry.loop)
}
