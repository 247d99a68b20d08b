import type { MarginsThere } from '../types/structure'

/** Relative; far below what is printed, far above the rounding of the same loop typed in another way. */
const tolerance = 1e-9

/** Whether any margin or the verdict differs between two analyses of a loop. The frequency at which the vector margin lies is none. */
export function isMoved(before: MarginsThere | null, after: MarginsThere | null): boolean {
  if (before === null || after === null) return before !== after
  if (before.verdict !== after.verdict || before.failure !== after.failure) return true
  if (differ(before.vectorMargin?.distance, after.vectorMargin?.distance)) return true
  const keys = new Set([...Object.keys(before.summary ?? {}), ...Object.keys(after.summary ?? {})]) as Set<keyof NonNullable<MarginsThere['summary']>>
  return [...keys].some(key => differ(before.summary?.[key], after.summary?.[key]))
}

function differ(one: number | null | undefined, other: number | null | undefined): boolean {
  if (typeof one !== 'number' || typeof other !== 'number') return (one ?? null) !== (other ?? null)
  return Math.abs(one - other) > tolerance * Math.max(Math.abs(one), Math.abs(other))
}
