import type { BlockChange } from '#shared/schemas/block'
import type { Block } from '#shared/types/block'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { assertNewest } from '../assertNewest'
import type { ServiceContext } from '../context'
import { findSystem } from '../systems/findSystem'
import { assertBlockNameFree } from './assertBlockNameFree'
import { assertGains } from './assertGains'
import { findBlock } from './findBlock'
import { listBlocks } from './listBlocks'
import { readBlock } from './readBlock'
import { storeGains, uploadOf } from './storeGains'
import { assertBlockUnused } from './usesOfBlock'

/**
 * Changes the named fields of a block. Throws 'conflict' from an older version or where the new name is taken, 'refused' for a new name while the old one is
 * used, 'invalid input' where a gain cannot be read; then nothing is stored.
 */
export function updateBlock(blockId: number, { version, byCondition, ...change }: BlockChange, context: ServiceContext): Promise<Block> {
  return writeTransaction(async () => {
    const row = await findBlock(blockId)
    const { systemId } = row
    const before = await readBlock(row)
    assertNewest(row, version, before)
    if (change.name !== undefined && change.name !== row.name) {
      await assertBlockNameFree(systemId, change.name, blockId)
      await assertBlockUnused(systemId, row.name, 'renamed')
    }
    if (change.definition !== undefined || byCondition !== undefined || change.name !== undefined) {
      const others = (await listBlocks(systemId)).filter(block => block.id !== blockId)
      await assertGains({ ...before, ...change, byCondition: byCondition ?? before.byCondition }, others, await findSystem(systemId))
    }
    await row.update({ ...change, ...(change.definition !== undefined && { uploadId: uploadOf(change.definition) }), version: version + 1 })
    if (byCondition !== undefined) await storeGains(row, byCondition)
    await recordAudit(context, 'block changed', { systemId, subjectId: blockId, payload: { ...change, ...(byCondition !== undefined && { byCondition }) } })
    return readBlock(row)
  })
}
