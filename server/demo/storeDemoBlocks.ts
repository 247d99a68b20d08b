import { newBlockSchema } from '#shared/schemas/block'
import type { BlockDefinition } from '#shared/types/block'
import type { OperatingCondition, System } from '#shared/types/system'
import { createBlock } from '../services/blocks/createBlock'
import type { ServiceContext } from '../services/context'
import { storeUpload } from '../services/uploads/storeUpload'
import type { DemoBlock, DemoSystem } from './DemoSystem'
import { valuesIn } from './valuesIn'

/** Stores the blocks of a demo system in their order, each file once. */
export async function storeDemoBlocks(system: System, demo: DemoSystem, conditions: OperatingCondition[], context: ServiceContext): Promise<void> {
  for (const { name, role, unitIn, unitOut, notes, gain, file } of demo.blocks) {
    const uploadId = file === undefined ? 0 : (await storeUpload(system.id, { name: file.name, bytes: Buffer.from(file.text) }, context)).id
    await createBlock(system.id, newBlockSchema.parse({ name, role, unitIn, unitOut, notes, ...gainsOf(gain, demo, conditions, uploadId) }), context)
  }
}

/** One definition for all conditions, or one for each. */
function gainsOf(gain: DemoBlock['gain'], demo: DemoSystem, conditions: OperatingCondition[], uploadId: number): { definition: BlockDefinition | null, byCondition: Record<number, BlockDefinition> } {
  if (typeof gain !== 'function') return { definition: gain, byCondition: {} }
  return {
    definition: null,
    byCondition: Object.fromEntries(conditions.map(({ id, code }, index) => [id, gain({ code, index, values: valuesIn(demo, index), uploadId })])),
  }
}
