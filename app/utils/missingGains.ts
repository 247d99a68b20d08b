import { namesInExpression } from '#shared/analysis/expressions/namesInExpression'
import type { UsedBlock } from './blocksUsed'

/** The blocks an expression needs that have no gain in the condition looked at, each told where the expression names it or the block that needs it. */
export function missingGains(expression: string, used: readonly UsedBlock[], conditionName: string): { message: string, position: number }[] {
  const places = namesInExpression(expression)
  let named = ''
  return used.flatMap(({ block, definition, depth }) => {
    // Blocks that a block names stand behind it.
    if (depth === 0) named = block.name
    if (definition !== null) return []
    const who = depth === 0 ? `The block ${block.name}` : `The block ${block.name}, which ${named} needs,`
    return [{ message: `${who} has no gain in ${conditionName}. Give it one there.`, position: places.find(({ name }) => name === named)?.position ?? 0 }]
  })
}
