import { AppError } from '#shared/errors/AppError'
import type { Block } from '#shared/types/block'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { BlockRow } from '../../database/models/BlockRow'
import { assertRoom } from '../assertRoom'
import type { ServiceContext } from '../context'
import { findSystem } from '../systems/findSystem'
import { assertBlockNameFree } from './assertBlockNameFree'
import { assertGains } from './assertGains'
import { listBlocks } from './listBlocks'
import { readBlock } from './readBlock'

/** Brings a deleted block back to its place. Throws 'conflict' where its name has been taken since, 'invalid input' where its gain no longer stands, as by a circle. */
export function restoreBlock(blockId: number, context: ServiceContext): Promise<Block> {
  return writeTransaction(async () => {
    const row = await BlockRow.unscoped().findByPk(blockId)
    if (row === null) throw new AppError('notFound', 'There is no such block.')
    if (row.deletedAt === null) return readBlock(row)
    await assertBlockNameFree(row.systemId, row.name)
    await assertRoom(BlockRow, row.systemId)
    await assertGains(await readBlock(row), await listBlocks(row.systemId), await findSystem(row.systemId))
    await row.update({ deletedAt: null, version: row.version + 1 })
    await recordAudit(context, 'block restored', { systemId: row.systemId, subjectId: blockId })
    return readBlock(row)
  })
}
