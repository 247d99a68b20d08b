import type { RevisionState } from '../types/report'

/** 'A draft 2' of a draft, 'A' of what was issued. */
export const revisionLabel = ({ letter, draftNumber, state }: { letter: string, draftNumber: number, state: RevisionState }): string =>
  (state === 'draft' ? `${letter} draft ${draftNumber}` : letter)
