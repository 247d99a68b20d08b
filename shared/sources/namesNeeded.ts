import { namesInExpression } from '../analysis/expressions/namesInExpression'

/** What is known of a block here: the expression of those that are one. */
type KnownBlock = { kind: string, expression?: string } | null | undefined

export interface NamesNeeded {
  /** blocks, in the order they are first met */
  blocks: string[]
  /** all other names: parameters, and what nobody knows */
  others: string[]
}

/**
 * What an expression needs by name, through the expressions of the blocks it names as well. A circle is gone round once.
 *
 * @param blockOf the gain of a block by name, in whatever form; null for a block that has none here, undefined where no block has the name
 */
export function namesNeeded(expression: string, blockOf: (name: string) => KnownBlock): NamesNeeded {
  const blocks = new Set<string>()
  const others = new Set<string>()
  const waiting = [expression]
  for (let next = waiting.pop(); next !== undefined; next = waiting.pop()) {
    for (const { name } of namesInExpression(next)) {
      if (blocks.has(name) || others.has(name)) continue
      const block = blockOf(name)
      if (block === undefined) others.add(name)
      else {
        blocks.add(name)
        if (block?.kind === 'expression') waiting.push(block.expression ?? '')
      }
    }
  }
  return { blocks: [...blocks], others: [...others] }
}
