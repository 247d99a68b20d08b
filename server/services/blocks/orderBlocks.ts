import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { BlockRow } from '../../database/models/BlockRow'
import type { ServiceContext } from '../context'
import { orderRows } from '../orderRows'

/** Puts the blocks of a system in the order of these ids. */
export function orderBlocks(systemId: number, ids: number[], context: ServiceContext): Promise<{ ids: number[] }> {
  return writeTransaction(async () => {
    await orderRows(BlockRow, systemId, ids)
    await recordAudit(context, 'blocks ordered', { systemId, payload: { ids } })
    return { ids }
  })
}
