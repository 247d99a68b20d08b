import type { NewCondition } from '#shared/schemas/condition'
import type { OperatingCondition } from '#shared/types/system'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { ConditionRow } from '../../database/models/ConditionRow'
import { presentCondition } from '../../presenters/presentCondition'
import { assertCodeFree } from '../assertCodeFree'
import { assertRoom } from '../assertRoom'
import { nowOf, type ServiceContext } from '../context'
import { nextPosition } from '../nextPosition'

/** Makes an operating condition at the end of the system's list. Throws 'conflict' where its code is taken. */
export function createCondition(systemId: number, fields: NewCondition, context: ServiceContext): Promise<OperatingCondition> {
  return writeTransaction(async () => {
    await assertCodeFree(ConditionRow, systemId, fields.code)
    await assertRoom(ConditionRow, systemId)
    const condition = await ConditionRow.create({ ...fields, systemId, position: await nextPosition(ConditionRow, systemId), version: 1, createdAt: nowOf(context) })
    await recordAudit(context, 'condition created', { systemId, subjectId: condition.id, payload: { ...fields } })
    return presentCondition(condition)
  })
}
