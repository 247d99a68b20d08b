import type { LoopAnalysis, LoopInput, FrequencyUnit } from './analysis'
import type { Criterion, Judgement } from './criterion'
import type { PageSize } from './brand'
import type { BlockDefinition, BlockRole } from './block'
import type { SourceDefinition } from './source'
import type { ClosedLoopPoles, ModeShiftTable, SourceDifference } from './structure'
import type { BreakAt } from './system'

/**
 * Everything a frozen draft was made from and everything that was found: plain data, canonical JSON (keys sorted),
 * enough to print the document again and to compare two revisions without the database.
 */
export interface ReportSnapshot {
  format: 'wideberth report snapshot'
  formatVersion: 1
  engineVersion: string
  /** ISO 8601, UTC */
  frozenAt: string
  frozenBy: string
  letter: string
  draftNumber: number
  changeNote: string
  brand: { teamName: string, accent: string, addressLine: string, pageSize: PageSize, mark: string | null }
  system: { name: string, customer: string, documentNumber: string, frequencyUnit: FrequencyUnit, description: string }
  report: { title: string, documentNumber: string, remarks: string }
  criteria: Criterion[]
  conditions: { code: string, name: string, coordinates: { name: string, unit: string, value: number }[], tags: string[], notes: string }[]
  loops: SnapshotLoop[]
  parameters: { name: string, unit: string, notes: string, values: Record<string, number> }[]
  /** the parts the loop gains are built from; not in snapshots frozen before there were blocks */
  blocks?: SnapshotBlock[]
  /** one for each loop and condition covered, in order of loops, then conditions */
  cells: SnapshotCell[]
  /** the issued revisions before this one, oldest first */
  history: { letter: string, changeNote: string, frozenBy: string, issuedBy: string, issuedAt: string }[]
}

export interface SnapshotLoop {
  code: string
  name: string
  axis: string
  breakPoint: string
  otherLoops: string
  notes: string
  remarks: string
  /** the block at which the loop is opened */
  breakAt?: BreakAt | null
  /** loops that are not at nominal while this one is open */
  loopStates?: { code: string, state: 'closed' | 'open' | 'held', gain?: number }[]
}

export interface SnapshotBlock {
  name: string
  role: BlockRole
  unitIn: string
  unitOut: string
  notes: string
  /** by condition code, as it holds there; a condition without one has no gain of this block */
  definitions: Record<string, BlockDefinition>
  /** by condition code, of what was read from a file: its name and the SHA-256 of its bytes */
  files?: Record<string, { name: string, sha256: string }>
}

/** A source kept beside the one of record. */
export interface SnapshotOtherSource {
  name: string
  kind: SourceDefinition['kind']
  /** why it is not the one of record */
  setAsideReason: string
  input: LoopInput | null
  analysis: LoopAnalysis | null
  failure: { message: string, path: string } | null
  /** from the source of record */
  difference: SourceDifference | null
}

export interface SnapshotCell {
  loopCode: string
  conditionCode: string
  source: {
    name: string
    kind: SourceDefinition['kind']
    definition: SourceDefinition
    /** of a measured response: file name and SHA-256 of the bytes uploaded */
    file: { name: string, sha256: string } | null
  } | null
  input: LoopInput | null
  analysis: LoopAnalysis | null
  failure: { message: string, path: string } | null
  judgement: Judgement
  closedLoopPoles?: ClosedLoopPoles | null
  modeShifts?: ModeShiftTable | null
  otherSources?: SnapshotOtherSource[]
  /** another break point of the same closed system says otherwise of it, in words */
  disagreement?: string | null
}

/** What an edition adds to a snapshot when the document is printed. */
export interface EditionFacts {
  edition: 'preview' | 'draft' | 'issued'
  /** 'A draft 2', 'A', or 'Preview' of what is not frozen yet */
  label: string
  preparedBy: string
  preparedAt: string
  approvedBy: string | null
  issuedAt: string | null
  snapshotSha256: string
}
