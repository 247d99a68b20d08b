import type { Block, BlockDefinition, BlockInUse } from '#shared/types/block'
import type { BlockEffect } from '#shared/types/structure'
import { callApi } from './apiClient'

export type BlockFields = Pick<Block, 'name' | 'role' | 'unitIn' | 'unitOut' | 'notes' | 'definition' | 'byCondition'>

export interface BlockDraft {
  /** null for a block that is not stored yet */
  blockId: number | null
  name: string
  role: Block['role']
  definition: BlockDefinition | null
  byCondition: Record<number, BlockDefinition>
}

const of = (systemId: number) => `/api/systems/${systemId}/blocks`
const at = (blockId: number) => `/api/blocks/${blockId}`

/** Routes of the blocks that loop gains are built from. */
export const blocksClient = {
  list: (systemId: number) => callApi<BlockInUse[]>('GET', of(systemId)),
  create: (systemId: number, fields: BlockFields) => callApi<Block>('POST', of(systemId), { body: fields }),
  order: (systemId: number, ids: number[]) => callApi<{ ids: number[] }>('PUT', `${of(systemId)}/order`, { body: { ids } }),
  /** what the draft of a block would move; nothing is stored */
  effects: (systemId: number, draft: BlockDraft) => callApi<BlockEffect[]>('POST', `${of(systemId)}/effects`, { body: draft }),
  change: (blockId: number, fields: Partial<BlockFields> & { version: number }) => callApi<Block>('PATCH', at(blockId), { body: fields }),
  remove: (blockId: number) => callApi<{ id: number }>('DELETE', at(blockId)),
  restore: (blockId: number) => callApi<Block>('POST', `${at(blockId)}/restore`),
}
