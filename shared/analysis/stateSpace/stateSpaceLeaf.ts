import { Rational } from '../../numeric/extended/Rational'
import type { StructureNote } from '../../types/analysis'
import type { StateSpaceGain } from '../../types/block'
import { AnalysisInputError } from '../AnalysisInputError'
import type { ExactLoop, FactorMap } from '../expressions/ExactLoop'
import { FactorProduct } from '../expressions/FactorProduct'
import type { ChannelAccuracy } from './channelAccuracy'
import { hiddenNotes } from './hiddenNotes'
import { rootFactors } from './rootFactors'
import { modelOfGain } from './modelOfGain'

/** One channel of a state space as part of a loop gain. */
export interface StateSpaceLeaf {
  /** null where the channel is zero */
  loop: ExactLoop | null
  /** of modes that the channel does not show; the block's name is the caller's to put in */
  notes: Omit<StructureNote, 'block'>[]
  /** how far `loop` may be from the matrices on the axis; above 1e-9 nothing of the loop can be called proven */
  accuracy: () => ChannelAccuracy
}

/**
 * C (sI - A)^-1 B + D, or the same in z, of one output and input (numbers from 0) as factors. The denominator holds one factor for every real eigenvalue of A and pair of complex ones, the same
 * for every channel; modes that the channel does not show stand in the numerator too. Factors are real polynomials of first and second order, right to double-double precision.
 *
 * @throws AnalysisInputError with an empty path (the block itself) where the eigenvalues or zeros cannot be found
 */
export function stateSpaceLeaf(gain: StateSpaceGain, output: number, input: number): StateSpaceLeaf {
  try {
    const model = modelOfGain(gain)
    const factors = model.channel(output, input)
    if (!factors) return { loop: null, notes: [], accuracy: () => ({ relative: 0, basis: 'a channel of a state space that is zero' }) }
    const numerator = rootFactors(factors.zeros)
    const denominator = rootFactors(factors.poles)
    const scale = Rational.fromDouble(factors.gain.high).plus(Rational.fromDouble(factors.gain.low)).times(leadOf(denominator)).over(leadOf(numerator))
    return {
      loop: { scale, delay: Rational.zero, numerator, denominator, inverted: FactorProduct.empty, common: new Set(), sums: new Map() },
      notes: hiddenNotes(factors.hidden, gain, output, input),
      accuracy: () => model.accuracyOf(output, input, factors),
    }
  }
  catch (error) {
    if (!(error instanceof RangeError)) throw error
    throw new AnalysisInputError(`The eigenvalues or zeros of the state space cannot be found: ${error.message}. Scale its states to like sizes or reduce its order.`, '')
  }
}

function leadOf(factors: FactorMap): Rational {
  let lead = 1n
  for (const { coefficients, power } of factors.values()) lead *= coefficients[coefficients.length - 1]! ** BigInt(power)
  return Rational.of(lead, 1n)
}
