import { AppError } from '#shared/errors/AppError'
import type { Loop } from '#shared/types/system'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { LoopRow } from '../../database/models/LoopRow'
import { presentLoop } from '../../presenters/presentLoop'
import { assertCodeFree } from '../assertCodeFree'
import { assertRoom } from '../assertRoom'
import type { ServiceContext } from '../context'

/** Brings a deleted loop back to its place. Throws 'conflict' where its code has been taken since. */
export function restoreLoop(loopId: number, context: ServiceContext): Promise<Loop> {
  return writeTransaction(async () => {
    const loop = await LoopRow.unscoped().findByPk(loopId)
    if (loop === null) throw new AppError('notFound', 'There is no such loop.')
    if (loop.deletedAt !== null) {
      await assertCodeFree(LoopRow, loop.systemId, loop.code)
      await assertRoom(LoopRow, loop.systemId)
      await loop.update({ deletedAt: null })
      await recordAudit(context, 'loop restored', { systemId: loop.systemId, subjectId: loopId })
    }
    return presentLoop(loop)
  })
}
