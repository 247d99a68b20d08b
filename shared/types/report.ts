import type { Versioned } from './system'

export interface Report extends Versioned {
  systemId: number
  title: string
  documentNumber: string
  /** the loops and conditions it covers, in the order they are printed */
  loopIds: number[]
  conditionIds: number[]
  /** Markdown */
  remarks: string
  /** Markdown by loop id */
  loopRemarks: Record<number, string>
}

export type RevisionState = 'draft' | 'issued' | 'superseded' | 'withdrawn'
export type ArtefactKind = 'html' | 'pdf' | 'zip'
/** A draft's document says 'A draft 2'; the issued one carries the letter, the approver and the date. */
export type Edition = 'draft' | 'issued'

export interface Artefact {
  kind: ArtefactKind
  edition: Edition
  fileName: string
  mediaType: string
  /** bytes */
  size: number
  sha256: string
}

export interface Revision {
  id: number
  reportId: number
  /** the letter it has, or, as a draft, the one it is a draft of */
  letter: string
  draftNumber: number
  /** 'A draft 2' or 'A' */
  label: string
  state: RevisionState
  /** why this revision was made, as printed in the revision history */
  changeNote: string
  snapshotSha256: string
  frozenBy: string
  frozenAt: string
  issuedBy: string | null
  issuedAt: string | null
  artefacts: Artefact[]
  /** the newest rendering job of this revision */
  job: Job | null
  /** why it cannot be issued, in words; empty when it can */
  obstacles: string[]
}

export type JobState = 'queued' | 'running' | 'done' | 'failed' | 'cancelled'

export interface Job {
  id: number
  kind: 'renderRevision'
  revisionId: number
  edition: Edition
  state: JobState
  /** the step and loop in words, such as 'Drawing SL-P Slew position (7 of 40)' */
  step: string
  done: number
  total: number
  error: string | null
}
