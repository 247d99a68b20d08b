/** One kind of find of the search, in order of v. */
export interface FindList {
  v: number[]
  /** +1 where the searched quantity rises through the find, -1 where it falls. */
  direction: number[]
  /** Proven bracket around each, and ln|L| and arg L at it. */
  from: number[]
  to: number[]
  logGain: number[]
  phase: number[]
}

/** A stretch of the axis where something could not be shown, or has no finite answer. */
export interface SearchException {
  from: number
  to: number
  code: string
  reason: string
}

export function emptyFinds(): FindList {
  return { v: [], direction: [], from: [], to: [], logGain: [], phase: [] }
}

/** Drops the finds from `length` on. */
export function truncateFinds(finds: FindList, length: number): void {
  finds.v.length = finds.direction.length = finds.from.length = finds.to.length = length
  finds.logGain.length = finds.phase.length = length
}

/** Puts the finds from `mark` on in order of v. */
export function sortFinds(finds: FindList, mark: number): void {
  const order = finds.v.slice(mark).map((_, i) => i + mark).sort((a, b) => finds.v[a]! - finds.v[b]!)
  for (const key of ['v', 'direction', 'from', 'to', 'logGain', 'phase'] as const) {
    const values = order.map(i => finds[key][i]!)
    for (let i = 0; i < values.length; i++) finds[key][mark + i] = values[i]!
  }
}
