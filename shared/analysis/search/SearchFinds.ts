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
