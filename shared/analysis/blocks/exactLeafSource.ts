import type { LoopStructure, StructureNote } from '../../types/analysis'
import { AnalysisInputError } from '../AnalysisInputError'
import type { ExactLoop } from '../expressions/ExactLoop'
import type { LeafSource } from './BlockScope'
import { exactAlgebra } from './exactAlgebra'
import { exactLeaf } from './exactLeaf'

/** What an expression uses of a block, in one domain. */
export interface UsedLeaf {
  block: string
  loop: ExactLoop
  sampled: boolean
}

/** The blocks of one loop held exactly, and what became known of them while the loop was built. */
export interface ExactLeafSource extends LeafSource<ExactLoop> {
  used: UsedLeaf[]
  notes: StructureNote[]
  /** Relative error of all leaves that have one; undefined where everything is exact. */
  accuracy: () => LoopStructure['accuracy']
}

/** Leaves of a loop over blocks without a measured one. */
export function exactLeafSource(): ExactLeafSource {
  const used: UsedLeaf[] = []
  const notes: StructureNote[] = []
  const accuracies: NonNullable<LoopStructure['accuracy']>[] = []
  return {
    used,
    notes,
    algebra: exactAlgebra(() => {
      throw new AnalysisInputError('The discrete equivalent of what stands behind a hold is not available yet.', 'expression', 0)
    }),
    rational: (block, gain, channel) => {
      const loop = exactLeaf(gain, channel)
      if (loop) used.push({ block, loop, sampled: 'sampleTime' in gain && gain.sampleTime !== undefined })
      return loop
    },
    expression: (block, { sampled, continuous }) => {
      if (sampled) used.push({ block, loop: sampled, sampled: true })
      if (continuous) used.push({ block, loop: continuous, sampled: false })
    },
    measured: () => {
      throw new AnalysisInputError('A measured block makes the loop a measured one.', '')
    },
    accuracy: () => accuracies.length === 0
      ? undefined
      : { relative: accuracies.reduce((sum, { relative }) => sum + relative, 0), basis: [...new Set(accuracies.map(({ basis }) => basis))].join('; ') },
  }
}
