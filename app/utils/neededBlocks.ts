import { namesInExpression } from '#shared/analysis/expressions/namesInExpression'
import type { BlockDefinition } from '#shared/types/block'

/** Those of the blocks that a gain needs: named by its expression, or by the expression of one that is needed. */
export function neededBlocks(definition: BlockDefinition, blocks: Readonly<Record<string, BlockDefinition>>): Record<string, BlockDefinition> {
  const needed: Record<string, BlockDefinition> = {}
  const look = (gain: BlockDefinition) => {
    for (const name of gain.kind === 'expression' ? namesInExpression(gain.expression).map(found => found.name) : []) {
      const found = Object.hasOwn(blocks, name) ? blocks[name] : undefined
      if (found === undefined || Object.hasOwn(needed, name)) continue
      needed[name] = found
      look(found)
    }
  }
  look(definition)
  return needed
}
