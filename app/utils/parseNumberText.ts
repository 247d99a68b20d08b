/** A typed number: null for a blank text, NaN for one that is no finite decimal number. */
export function parseNumberText(text: string): number | null {
  const typed = text.trim().replace(/^[−–]/, '-')
  if (typed === '') return null
  if (!/^[+-]?(?:\d+\.?\d*|\.\d+)(?:e[+-]?\d+)?$/i.test(typed)) return Number.NaN
  const value = Number(typed)
  return Number.isFinite(value) ? value : Number.NaN
}
