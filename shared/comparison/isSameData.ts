const fieldsOf = (value: object) => Object.entries(value).filter(([, entry]) => entry !== undefined)

/** Whether two pieces of plain data hold the same to the last bit, whatever the order of their keys; a field that is undefined is not there. */
export function isSameData(a: unknown, b: unknown): boolean {
  if (Object.is(a, b)) return true
  if (typeof a !== 'object' || typeof b !== 'object' || a === null || b === null || Array.isArray(a) !== Array.isArray(b)) return false
  const other = new Map(fieldsOf(b))
  const fields = fieldsOf(a)
  return fields.length === other.size && fields.every(([key, value]) => other.has(key) && isSameData(value, other.get(key)))
}
