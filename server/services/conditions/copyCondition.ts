import type { ConditionCopy } from '#shared/schemas/condition'
import type { OperatingCondition } from '#shared/types/system'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { BlockGainRow } from '../../database/models/BlockGainRow'
import { ConditionRow } from '../../database/models/ConditionRow'
import { ParameterValue } from '../../database/models/ParameterValue'
import { presentCondition } from '../../presenters/presentCondition'
import { assertCodeFree } from '../assertCodeFree'
import { assertRoom } from '../assertRoom'
import { nowOf, type ServiceContext } from '../context'
import { nextPosition } from '../nextPosition'
import { copySources } from '../sources/copySources'
import { findCondition } from './findCondition'

/** Copies an operating condition with its parameter values, its gains of blocks and all sources, under a code and name of its own. */
export function copyCondition(conditionId: number, fields: ConditionCopy, context: ServiceContext): Promise<OperatingCondition> {
  return writeTransaction(async () => {
    const original = await findCondition(conditionId)
    await assertCodeFree(ConditionRow, original.systemId, fields.code)
    await assertRoom(ConditionRow, original.systemId)
    const { systemId, coordinates, tags, notes } = original
    const copy = await ConditionRow.create({ systemId, coordinates, tags, notes, ...fields, position: await nextPosition(ConditionRow, systemId), version: 1, createdAt: nowOf(context) })
    const values = await ParameterValue.findAll({ where: { conditionId } })
    await ParameterValue.bulkCreate(values.map(({ parameterId, value }) => ({ parameterId, value, conditionId: copy.id })))
    const gains = await BlockGainRow.findAll({ where: { conditionId } })
    await BlockGainRow.bulkCreate(gains.map(({ blockId, definition, uploadId }) => ({ blockId, definition, uploadId, conditionId: copy.id })))
    await copySources({ conditionId }, source => ({ loopId: source.loopId, conditionId: copy.id }), context)
    await recordAudit(context, 'condition copied', { systemId, subjectId: copy.id, payload: { from: conditionId, ...fields } })
    return presentCondition(copy)
  })
}
