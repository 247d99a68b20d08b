import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { LoopRow } from '../../database/models/LoopRow'
import type { ServiceContext } from '../context'
import { orderRows } from '../orderRows'

/** Puts the loops of a system in the order of these ids. */
export function orderLoops(systemId: number, ids: number[], context: ServiceContext): Promise<{ ids: number[] }> {
  return writeTransaction(async () => {
    await orderRows(LoopRow, systemId, ids)
    await recordAudit(context, 'loops ordered', { systemId, payload: { ids } })
    return { ids }
  })
}
