import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { nowOf, type ServiceContext } from '../context'
import { findLoop } from './findLoop'

/** Takes a loop out of sight until it is restored; its sources stay with it. */
export function deleteLoop(loopId: number, context: ServiceContext): Promise<{ id: number }> {
  return writeTransaction(async () => {
    const loop = await findLoop(loopId)
    await loop.update({ deletedAt: nowOf(context) })
    await recordAudit(context, 'loop deleted', { systemId: loop.systemId, subjectId: loopId, payload: { code: loop.code } })
    return { id: loopId }
  })
}
