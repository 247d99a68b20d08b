import type { Criterion, Judgement } from './criterion'
import type { FrequencyUnit, LoopAnalysis } from './analysis'
import type { Role } from './person'
import type { Source } from './source'

/** Every stored row carries a version: a change names the version it was made from and is refused with 409 when that is not the newest. */
export interface Versioned {
  id: number
  version: number
}

export interface System extends Versioned {
  name: string
  customer: string
  documentNumber: string
  frequencyUnit: FrequencyUnit
  description: string
}

export interface SystemSummary extends System {
  /** null for who may read issued revisions only */
  loopCount: number | null
  conditionCount: number | null
  /** the caller's roles in this system */
  roles: Role[]
  /** letter of the newest issued revision over all its reports */
  newestIssue: string | null
}

/** The block at which a loop is opened. */
export interface BreakAt {
  block: string
  side: 'input' | 'output'
}

/** What another loop of the system does while this one is open. One that is not listed is at nominal. */
export interface OtherLoopState {
  loopId: number
  state: 'closed' | 'open' | 'held'
  /** the gain it is held at */
  gain?: number
}

export interface Loop extends Versioned {
  systemId: number
  code: string
  name: string
  /** axis or channel */
  axis: string
  /** the signal at which the loop is opened, in words; needed before freezing */
  breakPoint: string
  /** what else is to be said of the other loops while this one is open */
  otherLoops: string
  /** the block at which it is opened; null while none is chosen */
  breakAt: BreakAt | null
  /** what the other loops do meanwhile: those that are not at nominal */
  loopStates: OtherLoopState[]
  notes: string
  position: number
}

export interface OperatingCondition extends Versioned {
  systemId: number
  code: string
  name: string
  /** numeric coordinates such as { 'wave height, m': 3 } */
  coordinates: { name: string, unit: string, value: number }[]
  tags: string[]
  notes: string
  position: number
}

/** A named number of the system that expressions use, with a value in each operating condition. */
export interface Parameter extends Versioned {
  systemId: number
  name: string
  unit: string
  notes: string
  position: number
  /** by operating condition id; a missing one is an error where an expression needs it */
  values: Record<number, number>
}

/** One cell of the board: a loop in a condition, by its source of record. */
export interface BoardCell {
  loopId: number
  conditionId: number
  source: Pick<Source, 'id' | 'name' | 'kind'> | null
  analysis: LoopAnalysis | null
  /** why there is no analysis though there is a source */
  failure: { message: string, path: string } | null
  /** why its verdict cannot be right beside that of another loop of the same closed system; null where it agrees */
  disagreement: string | null
  judgement: Judgement
}

export interface Board {
  system: System
  loops: Loop[]
  conditions: OperatingCondition[]
  criteria: Criterion[]
  cells: BoardCell[]
}
