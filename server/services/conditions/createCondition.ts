import { AppError } from '#shared/errors/AppError'
import { limits } from '#shared/schemas/limits'
import type { NewCondition } from '#shared/schemas/condition'
import type { OperatingCondition } from '#shared/types/system'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { ConditionRow } from '../../database/models/ConditionRow'
import { presentCondition } from '../../presenters/presentCondition'
import { assertCodeFree } from '../assertCodeFree'
import { nowOf, type ServiceContext } from '../context'
import { nextPosition } from '../nextPosition'

/** Makes an operating condition at the end of the system's list. Throws 'conflict' where its code is taken. */
export function createCondition(systemId: number, fields: NewCondition, context: ServiceContext): Promise<OperatingCondition> {
  return writeTransaction(async () => {
    await assertCodeFree(ConditionRow, systemId, fields.code)
    if (await ConditionRow.count({ where: { systemId } }) >= limits.rows) throw new AppError('refused', `A system holds at most ${limits.rows} operating conditions.`)
    const condition = await ConditionRow.create({ ...fields, systemId, position: await nextPosition(ConditionRow, systemId), version: 1, createdAt: nowOf(context) })
    await recordAudit(context, 'condition created', { systemId, subjectId: condition.id, payload: { ...fields } })
    return presentCondition(condition)
  })
}
