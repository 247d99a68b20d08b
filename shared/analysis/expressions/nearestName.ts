/** The known name that differs least from what was typed; null where none is near enough to be meant. */
export function nearestName(typed: string, known: readonly string[]): string | null {
  let nearest: string | null = null
  let least = Math.ceil(typed.length / 3) + 1
  for (const name of known) {
    const difference = name.toLowerCase() === typed.toLowerCase() ? 0 : editDistance(typed, name, least)
    // something of the name must be left
    if (difference < Math.min(least, Math.max(typed.length, name.length))) [nearest, least] = [name, difference]
  }
  return nearest
}

/** Letters to insert, delete or replace (V. I. Levenshtein, 1966); at least `enough` where there are so many or more. */
function editDistance(a: string, b: string, enough: number): number {
  if (Math.abs(a.length - b.length) >= enough) return enough
  let row = Array.from({ length: b.length + 1 }, (_, j) => j)
  for (let i = 1; i <= a.length; i++) {
    const next = [i]
    for (let j = 1; j <= b.length; j++) {
      next.push(Math.min(row[j]! + 1, next[j - 1]! + 1, row[j - 1]! + (a[i - 1] === b[j - 1] ? 0 : 1)))
    }
    row = next
  }
  return row[b.length]!
}
