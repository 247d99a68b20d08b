import type { BlockGain } from '../../types/block'
import { AnalysisInputError } from '../AnalysisInputError'
import type { ExactLoop } from '../expressions/ExactLoop'
import { excessDegree } from '../expressions/excessDegree'
import type { ChannelNumbers } from './channelOfBlock'
import { stateSpaceLeaf } from '../stateSpace/stateSpaceLeaf'
import { coefficientsLeaf } from './leaves/coefficientsLeaf'
import { modalLeaf } from './leaves/modalLeaf'
import { sectionsLeaf } from './leaves/sectionsLeaf'
import { zerosPolesLeaf } from './leaves/zerosPolesLeaf'

/** The kinds whose channels are rational gains by themselves. */
export type RationalGain = Exclude<BlockGain, { kind: 'expression' | 'measured' | 'deadTime' | 'hold' }>

/** Where the numerator of each kind stands. */
const numeratorPaths: Record<RationalGain['kind'], string> = { coefficients: 'numerator', zerosPoles: 'zeros', stateSpace: '', sections: 'sections', modal: '' }

/**
 * One channel of a block held exactly, its dead time aside; null where it is zero.
 *
 * @throws AnalysisInputError with the path in the block, for an improper one too
 */
export function exactLeaf(gain: RationalGain, channel: ChannelNumbers): ExactLoop | null {
  const loop = leafOf(gain, channel)
  if (loop && excessDegree(loop) > 0) throw new AnalysisInputError(improper('sampleTime' in gain && gain.sampleTime !== undefined), numeratorPaths[gain.kind])
  return loop
}

/** Why a block with more zeros than poles is refused. */
export function improper(sampled: boolean): string {
  return sampled
    ? 'Improper: it has more zeros than poles, so it would need future samples.'
    : 'Improper: it has more zeros than poles, so its gain grows without bound towards high frequency. Give the lag that limits it.'
}

function leafOf(gain: RationalGain, { output, input }: ChannelNumbers): ExactLoop | null {
  switch (gain.kind) {
    case 'coefficients': return coefficientsLeaf(gain)
    case 'zerosPoles': return zerosPolesLeaf(gain)
    case 'sections': return sectionsLeaf(gain)
    case 'modal': return modalLeaf(gain, output, input)
    case 'stateSpace': return stateSpaceLeaf(gain, output, input).loop
  }
}
