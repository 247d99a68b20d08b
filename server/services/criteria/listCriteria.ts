import type { Criterion, CriterionQuantity } from '#shared/types/criterion'
import { CriterionRow } from '../../database/models/CriterionRow'

const order: CriterionQuantity[] = ['gainMargin', 'phaseMargin', 'vectorMargin', 'delayMargin']

/** The criteria of a system, one for each quantity, always in the same order. */
export async function listCriteria(systemId: number): Promise<Criterion[]> {
  const rows = await CriterionRow.findAll({ where: { systemId } })
  return order.map(quantity => ({ quantity, limit: rows.find(row => row.quantity === quantity)?.limitValue ?? null }))
}
