import { namesInExpression } from '#shared/analysis/expressions/namesInExpression'
import type { BlockDefinition } from '#shared/types/block'

/** The way by which a block comes to need itself, its name first and last; null where it does not. */
export function findCircle(name: string, definitions: ReadonlyMap<string, BlockDefinition | null>): string[] | null {
  const seen = new Set<string>()
  const ways: string[][] = [[name]]
  for (let way = ways.shift(); way !== undefined; way = ways.shift()) {
    const definition = definitions.get(way.at(-1) ?? '')
    if (definition?.kind !== 'expression') continue
    for (const needed of namesInExpression(definition.expression)) {
      if (needed.name === name) return [...way, name]
      if (!definitions.has(needed.name) || seen.has(needed.name)) continue
      seen.add(needed.name)
      ways.push([...way, needed.name])
    }
  }
  return null
}
