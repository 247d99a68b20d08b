import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { nowOf, type ServiceContext } from '../context'
import { findBlock } from './findBlock'
import { assertBlockUnused } from './usesOfBlock'

/** Takes a block out of sight until it is restored. Throws 'refused' while a source, another block or a break point names it, telling which. */
export function deleteBlock(blockId: number, context: ServiceContext): Promise<{ id: number }> {
  return writeTransaction(async () => {
    const block = await findBlock(blockId)
    await assertBlockUnused(block.systemId, block.name, 'deleted')
    await block.update({ deletedAt: nowOf(context) })
    await recordAudit(context, 'block deleted', { systemId: block.systemId, subjectId: blockId, payload: { name: block.name } })
    return { id: blockId }
  })
}
