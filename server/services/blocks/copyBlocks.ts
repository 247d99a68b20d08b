import type { BlockDefinition } from '#shared/types/block'
import { BlockGainRow } from '../../database/models/BlockGainRow'
import { BlockRow } from '../../database/models/BlockRow'
import { nowOf, type ServiceContext } from '../context'
import { uploadOf } from './storeGains'

interface CopyPlaces {
  systemId: number
  /** the new condition of an old one; undefined for one that is not copied */
  conditionOf: (conditionId: number) => number | undefined
  /** the new upload of an old one */
  uploadOf: (uploadId: number) => Promise<number>
}

/** Copies the blocks of a system with their gains and uploads into another one. */
export async function copyBlocks(systemId: number, places: CopyPlaces, context: ServiceContext): Promise<void> {
  const copyOf = async (definition: BlockDefinition) => 'uploadId' in definition ? { ...definition, uploadId: await places.uploadOf(definition.uploadId) } : definition
  for (const block of await BlockRow.findAll({ where: { systemId }, order: ['position', 'id'] })) {
    const { name, role, unitIn, unitOut, notes, position } = block
    const definition = block.definition && await copyOf(block.definition)
    const copy = await BlockRow.create({
      systemId: places.systemId, name, role, unitIn, unitOut, notes, definition, uploadId: uploadOf(definition), position, version: 1, createdAt: nowOf(context),
    })
    for (const gain of await BlockGainRow.findAll({ where: { blockId: block.id }, order: ['conditionId'] })) {
      const conditionId = places.conditionOf(gain.conditionId)
      if (conditionId === undefined) continue
      const own = await copyOf(gain.definition)
      await BlockGainRow.create({ blockId: copy.id, conditionId, definition: own, uploadId: uploadOf(own) })
    }
  }
}
