import type { ComplexPair } from '../../types/analysis'
import { AnalysisInputError } from '../AnalysisInputError'
import type { FactorList, FactoredLoop } from '../FactoredLoop'
import { checkDegrees } from './checkDegrees'
import type { LoopOptions } from './factorsFromCoefficients'
import { snapToBoundary } from './snapToBoundary'

/** Complex roots are taken as a conjugate pair when they agree to this (relative to their size). */
const PAIRING_TOLERANCE = 1e-9

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
  const n = roots.length
  const re = Float64Array.from(roots, root => root[0])
  const im = Float64Array.from(roots, root => root[1])
  for (let k = 0; k < n; k++) {
    if (!Number.isFinite(re[k]) || !Number.isFinite(im[k])) {
      throw new AnalysisInputError(`Entry ${k + 1} of the ${path} is not a pair of finite numbers.`, `${path}[${k}]`)
    }
  }
  const paired = new Uint8Array(n)
  for (let k = 0; k < n; k++) {
    if (im[k] === 0 || paired[k]) continue
    const partner = closestConjugate(re, im, paired, k)
    if (partner < 0) {
      throw new AnalysisInputError(`Entry ${k + 1} of the ${path}, ${re[k]} ${(im[k] as number) < 0 ? '-' : '+'} j${Math.abs(im[k] as number)}, stands without its conjugate: complex ${path} come in conjugate pairs.`, `${path}[${k}]`)
    }
    re[partner] = re[k] as number
    im[partner] = -(im[k] as number)
    paired[k] = 1
    paired[partner] = 1
  }
  return snapToBoundary({ re, im, correction: new Float64Array(n) }, sampled, null)
}

function closestConjugate(re: Float64Array, im: Float64Array, paired: Uint8Array, k: number): number {
  const x = re[k] as number
  const y = im[k] as number
  let smallest = PAIRING_TOLERANCE * Math.hypot(x, y)
  let found = -1
  for (let j = 0; j < re.length; j++) {
    if (j === k || paired[j] || im[j] === 0 || Math.sign(im[j] as number) === Math.sign(y)) continue
    const distance = Math.hypot((re[j] as number) - x, (im[j] as number) + y)
    if (distance < smallest || (distance === 0 && found < 0)) {
      smallest = distance
      found = j
    }
  }
  return found
}
