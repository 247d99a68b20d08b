import type { ConditionChange } from '#shared/schemas/condition'
import type { OperatingCondition } from '#shared/types/system'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { ConditionRow } from '../../database/models/ConditionRow'
import { presentCondition } from '../../presenters/presentCondition'
import { assertCodeFree } from '../assertCodeFree'
import { assertNewest } from '../assertNewest'
import type { ServiceContext } from '../context'
import { findCondition } from './findCondition'

/** Changes the named fields of an operating condition. Throws 'conflict' from an older version, or where the new code is taken. */
export function updateCondition(conditionId: number, { version, ...change }: ConditionChange, context: ServiceContext): Promise<OperatingCondition> {
  return writeTransaction(async () => {
    const condition = await findCondition(conditionId)
    assertNewest(condition, version, presentCondition(condition))
    if (change.code !== undefined) await assertCodeFree(ConditionRow, condition.systemId, change.code, conditionId)
    await condition.update({ ...change, version: version + 1 })
    await recordAudit(context, 'condition changed', { systemId: condition.systemId, subjectId: conditionId, payload: { ...change } })
    return presentCondition(condition)
  })
}
