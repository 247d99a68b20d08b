import type { MarginSummary } from './analysis'
import type { Verdict } from './criterion'

/** One side of a cell: null where that revision does not cover the loop in the condition. */
export interface ComparedSide {
  verdict: Verdict
  closedLoop: string | null
  /** null where there is no analysis or the closed loop is not stable */
  summary: MarginSummary | null
  /** least |1 + L|; null where there is no analysis or the closed loop is not shown to be stable */
  vectorMargin: number | null
  sourceName: string | null
}

export type ComparedQuantity = 'gainIncrease' | 'gainDecrease' | 'phaseLag' | 'phaseLead' | 'delay' | 'vectorMargin'

export interface ComparedCell {
  loopCode: string
  loopName: string
  conditionCode: string
  conditionName: string
  before: ComparedSide | null
  after: ComparedSide | null
  /** after less before, in the quantity's own unit; null where either is missing; 0 where both are the same to the last bit */
  differences: Record<ComparedQuantity, number | null>
  verdictChanged: boolean
  /** whether any input or result of the cell differs at all */
  changed: boolean
}

/** What changed from one revision to another, told from their snapshots alone. */
export interface RevisionComparison {
  before: { id: number, label: string }
  after: { id: number, label: string }
  loopsAdded: string[]
  loopsRemoved: string[]
  conditionsAdded: string[]
  conditionsRemoved: string[]
  /** in words, such as 'gain margin: 6 dB to 8 dB', 'parameter kSlP in C1: 7.2 to 6.6' */
  criteriaChanges: string[]
  parameterChanges: string[]
  /** such as 'block F (filter): gain changed in C1 and C2; used by SL-P' */
  blockChanges: string[]
  /** the title lines of loops opened elsewhere or with other loops in another state, such as 'SL-P: opened at valve command; ... to opened at the output of C; ...' */
  breakPointChanges: string[]
  /** in the order of the newer revision, cells that only the older one has last */
  cells: ComparedCell[]
}
