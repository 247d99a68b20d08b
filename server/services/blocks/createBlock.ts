import type { NewBlock } from '#shared/schemas/block'
import type { Block } from '#shared/types/block'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { BlockRow } from '../../database/models/BlockRow'
import { assertRoom } from '../assertRoom'
import { nowOf, type ServiceContext } from '../context'
import { nextPosition } from '../nextPosition'
import { findSystem } from '../systems/findSystem'
import { assertBlockNameFree } from './assertBlockNameFree'
import { assertGains } from './assertGains'
import { listBlocks } from './listBlocks'
import { readBlock } from './readBlock'
import { storeGains, uploadOf } from './storeGains'

/** Makes a block at the end of the system's list. Throws 'conflict' where its name is taken, 'invalid input' where a gain cannot be read; then nothing is stored. */
export function createBlock(systemId: number, fields: NewBlock, context: ServiceContext): Promise<Block> {
  const { byCondition, ...block } = fields
  return writeTransaction(async () => {
    await assertBlockNameFree(systemId, block.name)
    await assertRoom(BlockRow, systemId)
    await assertGains(fields, await listBlocks(systemId), await findSystem(systemId))
    const row = await BlockRow.create({
      ...block, systemId, uploadId: uploadOf(block.definition), position: await nextPosition(BlockRow, systemId), version: 1, createdAt: nowOf(context),
    })
    await storeGains(row, byCondition)
    await recordAudit(context, 'block created', { systemId, subjectId: row.id, payload: { ...fields } })
    return readBlock(row)
  })
}
