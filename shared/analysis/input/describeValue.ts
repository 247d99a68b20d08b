/** A short word for a value in an error message, never long however long the value is. */
export function describeValue(value: unknown): string {
  if (typeof value === 'number') return String(value)
  if (value === null || value === undefined) return 'nothing'
  if (Array.isArray(value)) return 'a list'
  if (typeof value === 'string') return value.length > 40 ? `"${value.slice(0, 40)}..."` : `"${value}"`
  return typeof value === 'boolean' ? String(value) : `a value of type ${typeof value}`
}
