import { describeAccuracy } from '#shared/formatting/describeAccuracy'
import { describeStructureNote } from '#shared/formatting/describeStructureNote'
import { formatDelay } from '#shared/formatting/formatDelay'
import { gainDecreaseCaution } from '#shared/formatting/gainDecreaseCaution'
import type { LoopAnalysis } from '#shared/types/analysis'

const sentence = (words: string) => `${words.charAt(0).toUpperCase()}${words.slice(1)}${/[.!?]$/.test(words) ? '' : '.'}`

/** What a reader must know of how the loop gain was built from blocks: its sampling, its accuracy, hidden states. */
export function structureWords({ structure, summary }: LoopAnalysis): string[] {
  const caution = gainDecreaseCaution(summary)
  const accuracy = describeAccuracy(structure)
  return [
    ...(structure?.sampleTime === undefined ? [] : [`Sampled every ${formatDelay(structure.sampleTime)}${structure.approximated ? '; margins are those of the exact discrete equivalent' : ''}.`]),
    ...(accuracy === null ? [] : [sentence(accuracy)]),
    ...(structure?.notes ?? []).map(note => sentence(describeStructureNote(note))),
    ...(caution === null ? [] : [sentence(caution)]),
  ]
}
