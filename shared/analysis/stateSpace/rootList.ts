import type { DoubleDoubleRoots } from '../../numeric/doubleDouble/DoubleDoubleRoots'

/** One root, a double-double in each part. */
export interface PreciseRoot {
  re: number
  reLow: number
  im: number
  imLow: number
  /** see DoubleDoubleRoots */
  correction: number
}

export function rootList(roots: DoubleDoubleRoots): PreciseRoot[] {
  return Array.from(roots.re, (re, k) => ({ re, reLow: roots.reLow[k]!, im: roots.im[k]!, imLow: roots.imLow[k]!, correction: roots.correction[k]! }))
}
