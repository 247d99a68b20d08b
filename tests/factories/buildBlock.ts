import { newBlockSchema } from '#shared/schemas/block'
import type { Block, BlockDefinition } from '#shared/types/block'
import { createBlock } from '#server/services/blocks/createBlock'
import type { ServiceContext } from '#server/services/context'

/** A block of a system with this gain in every condition. */
export const buildBlock = (systemId: number, context: ServiceContext, name: string, definition: BlockDefinition | null, fields: Partial<Parameters<typeof createBlock>[1]> = {}): Promise<Block> =>
  createBlock(systemId, newBlockSchema.parse({ name, role: 'other', definition, ...fields }), context)

/** A gain typed as an expression. */
export const typed = (expression: string, sampleTime?: number): BlockDefinition => ({ kind: 'expression', expression, ...(sampleTime !== undefined && { sampleTime }) })
