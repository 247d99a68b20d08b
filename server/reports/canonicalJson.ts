/**
 * JSON with the keys of every object sorted and no white space: equal data give equal bytes, whatever order they were put together in.
 * Fields that are undefined are left out. Throws a RangeError, naming the place, for a number JSON cannot carry.
 */
export function canonicalJson(value: unknown): string {
  return write(value, '')
}

function write(value: unknown, path: string): string {
  if (value === null || typeof value === 'string' || typeof value === 'boolean') return JSON.stringify(value)
  if (typeof value === 'number') {
    if (!Number.isFinite(value)) throw new RangeError(`${path || 'the value'} is ${value}, which JSON cannot carry`)
    return JSON.stringify(value)
  }
  if (Array.isArray(value)) return `[${value.map((entry, index) => write(entry, `${path}[${index}]`)).join(',')}]`
  if (typeof value === 'object') {
    const fields = Object.entries(value)
      .filter(([, entry]) => entry !== undefined)
      .sort(([a], [b]) => (a < b ? -1 : 1))
      .map(([key, entry]) => `${JSON.stringify(key)}:${write(entry, path ? `${path}.${key}` : key)}`)
    return `{${fields.join(',')}}`
  }
  throw new RangeError(`${path || 'the value'} is a ${typeof value}, which JSON cannot carry`)
}
