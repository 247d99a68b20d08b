/** An instant given as ISO 8601 in UTC, as printed: '2026-11-30 14:05 UTC'. Throws a RangeError for a text that is no instant. */
export function formatDateTime(instant: string): string {
  const date = new Date(instant)
  return `${date.toISOString().slice(0, 16).replace('T', ' ')} UTC`
}
