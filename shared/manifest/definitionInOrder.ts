/** A definition with its keys in the manifest's order: `kind` first, then alphabetically, and so in every object in it. Fields that are undefined are left out. */
export function definitionInOrder<Definition>(definition: Definition): Definition {
  return inOrder(definition) as Definition
}

function inOrder(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(inOrder)
  if (typeof value !== 'object' || value === null) return value
  return Object.fromEntries(Object.entries(value)
    .filter(([, entry]) => entry !== undefined)
    .sort(([a], [b]) => Number(b === 'kind') - Number(a === 'kind') || (a < b ? -1 : 1))
    .map(([key, entry]) => [key, inOrder(entry)]))
}
