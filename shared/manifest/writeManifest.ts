import type { Manifest } from '../types/manifest'

/** Characters up to which a list of plain values, or of pairs of them, stands on one line. */
const lineWidth = 140

/**
 * The text of a manifest: two spaces a level, a line feed at the end, the shortest digits that give a number back, keys in the order they stand in;
 * `definitionInOrder` puts those of definitions in theirs. Throws a RangeError, naming the place, for a number JSON cannot carry.
 */
export const writeManifest = (manifest: Manifest): string => `${write(manifest, '', '')}\n`

const isPlain = (value: unknown) => typeof value !== 'object' || value === null
const isPair = (value: unknown) => Array.isArray(value) && value.length === 2 && value.every(isPlain)

function write(value: unknown, path: string, indent: string): string {
  if (value === null || typeof value === 'string' || typeof value === 'boolean') return JSON.stringify(value)
  if (typeof value === 'number') {
    if (!Number.isFinite(value)) throw new RangeError(`${path} is ${value}, which JSON cannot carry`)
    return JSON.stringify(value)
  }
  if (typeof value !== 'object') throw new RangeError(`${path} is a ${typeof value}, which JSON cannot carry`)
  const deeper = `${indent}  `
  if (!Array.isArray(value)) {
    const fields = Object.entries(value).filter(([, entry]) => entry !== undefined)
    return block('{', fields.map(([key, entry]) => `${JSON.stringify(key)}: ${write(entry, path ? `${path}.${key}` : key, deeper)}`), '}', indent)
  }
  const entries = value.map((entry, index) => write(entry, `${path}[${index}]`, deeper))
  const line = `[${entries.join(', ')}]`
  return value.every(entry => isPlain(entry) || isPair(entry)) && indent.length + line.length <= lineWidth ? line : block('[', entries, ']', indent)
}

const block = (open: string, entries: string[], close: string, indent: string) =>
  entries.length === 0 ? open + close : `${open}\n${entries.map(entry => `${indent}  ${entry}`).join(',\n')}\n${indent}${close}`
