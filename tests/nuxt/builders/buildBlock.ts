import type { Block, BlockDefinition } from '#shared/types/block'

let id = 0

/** A block of system 1: only what a test is about is given. */
export function buildBlock(name: string, definition: BlockDefinition | null, fields: Partial<Block> = {}): Block {
  id += 1
  return { id, version: 1, systemId: 1, name, role: 'other', unitIn: '', unitOut: '', notes: '', position: id, definition, byCondition: {}, ...fields }
}
