import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { ConditionRow } from '../../database/models/ConditionRow'
import type { ServiceContext } from '../context'
import { orderRows } from '../orderRows'

/** Puts the operating conditions of a system in the order of these ids. */
export function orderConditions(systemId: number, ids: number[], context: ServiceContext): Promise<{ ids: number[] }> {
  return writeTransaction(async () => {
    await orderRows(ConditionRow, systemId, ids)
    await recordAudit(context, 'conditions ordered', { systemId, payload: { ids } })
    return { ids }
  })
}
