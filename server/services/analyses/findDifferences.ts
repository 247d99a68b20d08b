import type { FrequencyUnit } from '#shared/types/analysis'
import type { AnalysedSource } from '#shared/types/source'
import type { SourceDifference } from '#shared/types/structure'
import type { OpenContext } from '../context'
import { runEngine } from './runEngine'

export interface SourcePair {
  reference: AnalysedSource
  other: AnalysedSource
}

const sideOf = ({ source, input, analysis }: AnalysedSource) => ({ name: source.name, input, analysis })

/** How far the other source of each pair lies from its reference, in their order. Computed in the pool and kept; what cannot be compared says why in its `reason`. */
export async function findDifferences(pairs: readonly SourcePair[], frequencyUnit: FrequencyUnit, context: OpenContext): Promise<SourceDifference[]> {
  const answers = await runEngine('sourceDifference', pairs.map(({ reference, other }) => ({ reference: sideOf(reference), other: sideOf(other) })), context)
  return pairs.map(({ reference, other }, index): SourceDifference => {
    const answer = answers[index]
    if (answer === undefined) throw new Error('The engine answered fewer pairs than it was asked.')
    return 'error' in answer
      ? { frequencyUnit, reference: reference.source.name, other: other.source.name, bands: [], basis: '', reason: answer.error.message }
      : answer
  })
}
