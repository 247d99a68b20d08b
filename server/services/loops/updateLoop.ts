import type { LoopChange } from '#shared/schemas/loop'
import type { Loop } from '#shared/types/system'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { LoopRow } from '../../database/models/LoopRow'
import { presentLoop } from '../../presenters/presentLoop'
import { assertCodeFree } from '../assertCodeFree'
import { assertNewest } from '../assertNewest'
import type { ServiceContext } from '../context'
import { assertLoopStructure } from './assertLoopStructure'
import { findLoop } from './findLoop'

/** Changes the named fields of a loop. Throws 'conflict' from an older version, or where the new code is taken. */
export function updateLoop(loopId: number, { version, ...change }: LoopChange, context: ServiceContext): Promise<Loop> {
  return writeTransaction(async () => {
    const loop = await findLoop(loopId)
    assertNewest(loop, version, presentLoop(loop))
    if (change.code !== undefined) await assertCodeFree(LoopRow, loop.systemId, change.code, loopId)
    await assertLoopStructure(loop.systemId, loopId, change)
    await loop.update({ ...change, version: version + 1 })
    await recordAudit(context, 'loop changed', { systemId: loop.systemId, subjectId: loopId, payload: { ...change } })
    return presentLoop(loop)
  })
}
