import type { LoopCopy } from '#shared/schemas/loop'
import type { Loop } from '#shared/types/system'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { LoopRow } from '../../database/models/LoopRow'
import { presentLoop } from '../../presenters/presentLoop'
import { assertCodeFree } from '../assertCodeFree'
import { assertRoom } from '../assertRoom'
import { nowOf, type ServiceContext } from '../context'
import { nextPosition } from '../nextPosition'
import { copySources } from '../sources/copySources'
import { findLoop } from './findLoop'

/** Copies a loop with all its sources to the end of the list, under a code and name of its own. */
export function copyLoop(loopId: number, fields: LoopCopy, context: ServiceContext): Promise<Loop> {
  return writeTransaction(async () => {
    const original = await findLoop(loopId)
    await assertCodeFree(LoopRow, original.systemId, fields.code)
    await assertRoom(LoopRow, original.systemId)
    const { systemId, axis, breakPoint, otherLoops, breakAt, loopStates, notes } = original
    const copy = await LoopRow.create({ systemId, axis, breakPoint, otherLoops, breakAt, loopStates, notes, ...fields, position: await nextPosition(LoopRow, systemId), version: 1, createdAt: nowOf(context) })
    await copySources({ loopId }, source => ({ loopId: copy.id, conditionId: source.conditionId }), context)
    await recordAudit(context, 'loop copied', { systemId, subjectId: copy.id, payload: { from: loopId, ...fields } })
    return presentLoop(copy)
  })
}
