import type { ArtefactKind, RevisionState } from '../types/report'

/** Everything a decision on issuing hangs on. */
export interface IssueFacts {
  state: RevisionState
  letter: string
  /** whether another revision of this report has been issued under this letter */
  letterIsIssued: boolean
  hasNewerDraft: boolean
  /** whether the person asking froze this draft */
  isOwnWork: boolean
  /** the artefacts of the draft that are stored */
  draftArtefacts: readonly ArtefactKind[]
  /** pairs of a model source whose lists are not proven, or that could not be analysed */
  unproven: readonly { loopCode: string, conditionCode: string }[]
  isBeingIssued: boolean
}

/** Pairs named one by one; more are counted. */
const namedPairs = 5

function unprovenWords(unproven: IssueFacts['unproven']): string {
  const named = unproven.slice(0, namedPairs).map(({ loopCode, conditionCode }) => `${loopCode} in ${conditionCode}`).join(', ')
  const more = unproven.length > namedPairs ? ` and ${unproven.length - namedPairs} more` : ''
  return `Not proven: ${named}${more}. A report is issued only when every list of crossings of a model is proven.`
}

/** Why a draft cannot be issued by the person asking, in words; empty when it can. */
export function issueObstacles(facts: IssueFacts): string[] {
  if (facts.state !== 'draft') return [`This revision is ${facts.state} already.`]
  const missing = (['html', 'pdf', 'zip'] as const).filter(kind => !facts.draftArtefacts.includes(kind))
  return [
    ...(facts.letterIsIssued ? [`Revision ${facts.letter} has been issued: freeze a draft of the next letter.`] : []),
    ...(facts.hasNewerDraft ? [`There is a newer draft of revision ${facts.letter}: issue that one.`] : []),
    ...(facts.isBeingIssued ? ['It is being issued at this moment.'] : []),
    ...(missing.length > 0 ? [`The draft is not rendered whole yet: ${missing.map(kind => kind.toUpperCase()).join(', ')} missing.`] : []),
    ...(facts.unproven.length > 0 ? [unprovenWords(facts.unproven)] : []),
    ...(facts.isOwnWork ? ['You froze this draft yourself: another approver has to issue it.'] : []),
  ]
}
