import type { ComplexPair } from '../../types/analysis'
import { AnalysisInputError } from '../AnalysisInputError'
import type { FactorList, FactoredLoop } from '../FactoredLoop'
import { checkDegrees } from './checkDegrees'
import { conjugatePairs } from './conjugatePairs'
import type { LoopOptions } from './factorsFromCoefficients'
import { snapToBoundary } from './snapToBoundary'

/**
 * A loop given by zeros, poles (rad/s, or plain numbers in z) and gain as factors: pairs made exactly conjugate, those within
 * 1e-9 of the stability boundary put exactly on it; the factors are taken as exact.
 *
 * @throws AnalysisInputError for a number that is not finite, a gain of zero, a complex root without its conjugate, an
 *   improper loop gain; `path` names the entry, as in 'poles[3]'
 */
export function factorsFromRoots(zeros: ComplexPair[], poles: ComplexPair[], gain: number, options: LoopOptions): FactoredLoop {
  if (!Number.isFinite(gain)) throw new AnalysisInputError('The gain is not a finite number.', 'gain')
  if (gain === 0) throw new AnalysisInputError('The gain is zero: a loop gain of zero has no crossings to find.', 'gain')
  const sampled = options.sampleTime !== undefined
  checkDegrees(zeros.length, poles.length, sampled, 'zeros')
  return {
    gain,
    zeros: readRoots(zeros, sampled, 'zeros'),
    poles: readRoots(poles, sampled, 'poles'),
    deadTime: options.deadTime,
    ...(sampled ? { sampleTime: options.sampleTime } : {}),
  }
}

function readRoots(roots: ComplexPair[], sampled: boolean, path: 'zeros' | 'poles'): FactorList {
  return snapToBoundary({ ...conjugatePairs(roots, path), correction: new Float64Array(roots.length) }, sampled, null)
}
