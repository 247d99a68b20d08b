import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { nowOf, type ServiceContext } from '../context'
import { findSystem } from './findSystem'

/** Takes a system, and with it all it holds, out of sight until it is restored. */
export function deleteSystem(systemId: number, context: ServiceContext): Promise<{ id: number }> {
  return writeTransaction(async () => {
    const system = await findSystem(systemId)
    await system.update({ deletedAt: nowOf(context) })
    await recordAudit(context, 'system deleted', { systemId, subjectId: systemId, payload: { name: system.name } })
    return { id: systemId }
  })
}
