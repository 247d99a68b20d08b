import type { LoopAnalysis } from '#shared/types/analysis'
import { formatDelay } from '#shared/formatting/formatDelay'

/** What a reader must know of how the loop gain was built from blocks: its sampling, its accuracy, hidden states. */
export function structureWords({ structure }: LoopAnalysis): string[] {
  if (structure === undefined) return []
  return [
    ...(structure.sampleTime === undefined ? [] : [`Sampled every ${formatDelay(structure.sampleTime)}.`]),
    ...(structure.accuracy === undefined ? [] : [`${structure.accuracy.basis}.`]),
    ...structure.notes.map(({ block, message }) => (block === '' ? message : `${block}: ${message}`)),
  ]
}
