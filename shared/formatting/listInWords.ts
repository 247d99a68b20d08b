/** 'C1', 'C1 and C2', 'C1, C2 and C4'. */
export function listInWords(entries: readonly string[]): string {
  const last = entries[entries.length - 1]
  return last === undefined ? '' : entries.length === 1 ? last : `${entries.slice(0, -1).join(', ')} and ${last}`
}
