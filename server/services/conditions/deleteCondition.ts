import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { nowOf, type ServiceContext } from '../context'
import { findCondition } from './findCondition'

/** Takes an operating condition out of sight until it is restored; its sources and gains of blocks stay with it. */
export function deleteCondition(conditionId: number, context: ServiceContext): Promise<{ id: number }> {
  return writeTransaction(async () => {
    const condition = await findCondition(conditionId)
    await condition.update({ deletedAt: nowOf(context) })
    await recordAudit(context, 'condition deleted', { systemId: condition.systemId, subjectId: conditionId, payload: { code: condition.code } })
    return { id: conditionId }
  })
}
