import { AppError } from '#shared/errors/AppError'
import type { OperatingCondition } from '#shared/types/system'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { ConditionRow } from '../../database/models/ConditionRow'
import { presentCondition } from '../../presenters/presentCondition'
import { assertNoCircle } from '../blocks/assertGains'
import { listBlocks } from '../blocks/listBlocks'
import { assertCodeFree } from '../assertCodeFree'
import { assertRoom } from '../assertRoom'
import type { ServiceContext } from '../context'

/**
 * Brings a deleted operating condition back to its place. Throws 'conflict' where its code has been taken since, 'invalid input' where blocks that were changed since
 * would name one another in a circle by their gains there.
 */
export function restoreCondition(conditionId: number, context: ServiceContext): Promise<OperatingCondition> {
  return writeTransaction(async () => {
    const condition = await ConditionRow.unscoped().findByPk(conditionId)
    if (condition === null) throw new AppError('notFound', 'There is no such operating condition.')
    if (condition.deletedAt !== null) {
      await assertCodeFree(ConditionRow, condition.systemId, condition.code)
      await assertRoom(ConditionRow, condition.systemId)
      await condition.update({ deletedAt: null })
      const blocks = await listBlocks(condition.systemId)
      for (const block of blocks) {
        if (block.byCondition[conditionId]) assertNoCircle(block, blocks.filter(other => other !== block))
      }
      await recordAudit(context, 'condition restored', { systemId: condition.systemId, subjectId: conditionId })
    }
    return presentCondition(condition)
  })
}
