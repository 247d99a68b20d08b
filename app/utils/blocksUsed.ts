import type { Block, BlockDefinition } from '#shared/types/block'
import { namesUsed } from './namesUsed'

/** A block that a loop gain is built from, in one operating condition. */
export interface UsedBlock {
  block: Block
  /** its gain there; null where it has none */
  definition: BlockDefinition | null
  /** whether that is one of the condition's own */
  ofCondition: boolean
  /** 0 where the loop gain itself names it, 1 where a block of the loop gain does, and so on */
  depth: number
}

/** Every block an expression names, directly or by another block's expression, in order of first use; each once, those it names behind it. */
export function blocksUsed(expression: string, blocks: readonly Block[], conditionId: number): UsedBlock[] {
  const byName = new Map(blocks.map(block => [block.name, block]))
  const used = new Map<string, UsedBlock>()
  const visit = (text: string, depth: number) => {
    for (const name of namesUsed(text)) {
      const block = byName.get(name)
      if (block === undefined || used.has(name)) continue
      const own = block.byCondition[conditionId]
      const definition = own ?? block.definition
      used.set(name, { block, definition, ofCondition: own !== undefined, depth })
      if (definition?.kind === 'expression') visit(definition.expression, depth + 1)
    }
  }
  visit(expression, 0)
  return [...used.values()]
}
