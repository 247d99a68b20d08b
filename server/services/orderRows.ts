import { AppError } from '#shared/errors/AppError'
import type { BlockRow } from '../database/models/BlockRow'
import type { ConditionRow } from '../database/models/ConditionRow'
import type { LoopRow } from '../database/models/LoopRow'

/** Puts a system's rows in the order of these ids. Throws 'conflict' where they are not just the rows there are. */
export async function orderRows(model: typeof LoopRow | typeof ConditionRow | typeof BlockRow, systemId: number, ids: number[]): Promise<void> {
  const rows = await (model as typeof LoopRow).findAll({ where: { systemId } })
  const known = new Set(rows.map(row => row.id))
  if (rows.length !== ids.length || ids.some(id => !known.has(id))) {
    const current = rows.sort((a, b) => a.position - b.position).map(row => row.id)
    throw new AppError('conflict', 'The list has changed in the meantime. Order it again.', { path: 'ids', details: { current } })
  }
  for (const row of rows) await row.update({ position: ids.indexOf(row.id) + 1 })
}
