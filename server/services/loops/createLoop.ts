import type { NewLoop } from '#shared/schemas/loop'
import type { Loop } from '#shared/types/system'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { LoopRow } from '../../database/models/LoopRow'
import { presentLoop } from '../../presenters/presentLoop'
import { assertCodeFree } from '../assertCodeFree'
import { assertRoom } from '../assertRoom'
import { nowOf, type ServiceContext } from '../context'
import { nextPosition } from '../nextPosition'
import { assertLoopStructure } from './assertLoopStructure'

/** Makes a loop at the end of the system's list. Throws 'conflict' where its code is taken, 'invalid input' for a break point or states that cannot be. */
export function createLoop(systemId: number, fields: NewLoop, context: ServiceContext): Promise<Loop> {
  return writeTransaction(async () => {
    await assertCodeFree(LoopRow, systemId, fields.code)
    await assertRoom(LoopRow, systemId)
    await assertLoopStructure(systemId, null, fields)
    const loop = await LoopRow.create({ ...fields, systemId, position: await nextPosition(LoopRow, systemId), version: 1, createdAt: nowOf(context) })
    await recordAudit(context, 'loop created', { systemId, subjectId: loop.id, payload: { ...fields } })
    return presentLoop(loop)
  })
}
