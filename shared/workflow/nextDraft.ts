import type { RevisionState } from '../types/report'
import { nextRevisionLetter } from './revisionLetters'

/** Order of the letters of ASME Y14.35: shorter first, then by the alphabet. */
const compareLetters = (a: string, b: string) => a.length - b.length || (a < b ? -1 : a > b ? 1 : 0)

/** The letter and number of the next draft: of the letter after the newest one issued, counted on from the drafts of that letter there are. */
export function nextDraft(revisions: readonly { letter: string, draftNumber: number, state: RevisionState }[]): { letter: string, draftNumber: number } {
  const issued = revisions.filter(({ state }) => state !== 'draft').map(({ letter }) => letter).sort(compareLetters)
  const letter = nextRevisionLetter(issued.at(-1) ?? null)
  const drafts = revisions.filter(revision => revision.letter === letter).map(({ draftNumber }) => draftNumber)
  return { letter, draftNumber: Math.max(0, ...drafts) + 1 }
}
