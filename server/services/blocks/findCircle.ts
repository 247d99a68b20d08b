import type { BlockDefinition } from '#shared/types/block'

/**
 * The way by which a block comes to need itself, its name first and last; null where it does not.
 *
 * @param namesIn the names in an expression
 */
export function findCircle(name: string, definitions: ReadonlyMap<string, BlockDefinition | null>, namesIn: (expression: string) => readonly string[]): string[] | null {
  const seen = new Set<string>()
  const ways: string[][] = [[name]]
  for (let way = ways.shift(); way !== undefined; way = ways.shift()) {
    const definition = definitions.get(way.at(-1) ?? '')
    if (definition?.kind !== 'expression') continue
    for (const needed of namesIn(definition.expression)) {
      if (needed === name) return [...way, name]
      if (!definitions.has(needed) || seen.has(needed)) continue
      seen.add(needed)
      ways.push([...way, needed])
    }
  }
  return null
}
