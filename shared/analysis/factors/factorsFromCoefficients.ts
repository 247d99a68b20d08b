import type { ExactPolynomial } from '../../numeric/extended/ExactPolynomial'
import { exactFromDoubles } from '../../numeric/extended/exactFromDoubles'
import { AnalysisInputError } from '../AnalysisInputError'
import type { FactoredLoop } from '../FactoredLoop'
import { checkDegrees } from './checkDegrees'
import { factorsFromPolynomials } from './factorsFromPolynomials'

export interface LoopOptions {
  /** s; given for a loop in z */
  sampleTime?: number
  /** s, at least 0 */
  deadTime: number
}

/**
 * A loop given by its coefficients, highest power first, as factors: zeros and poles to the last bit or so of each part
 * (also of light damping), with the proven error of each, those that count as on the stability boundary exactly on it.
 * Leading zeros of the lists are dropped; trailing zeros are roots exactly at 0.
 *
 * @throws AnalysisInputError for an empty list, a number that is not finite, a zero numerator or denominator, a loop gain
 *   that grows without bound (or, in z, needs future samples)
 */
export function factorsFromCoefficients(numerator: number[], denominator: number[], options: LoopOptions): FactoredLoop {
  const top = readCoefficients(numerator, 'numerator')
  const bottom = readCoefficients(denominator, 'denominator')
  const sampled = options.sampleTime !== undefined
  checkDegrees(top.coefficients.length - 1, bottom.coefficients.length - 1, sampled, 'numerator')
  const leadOf = (list: number[]) => list.find(value => value !== 0) as number
  const gain = leadOf(numerator) / leadOf(denominator)
  if (gain === 0 || !Number.isFinite(gain)) {
    throw new AnalysisInputError('The leading coefficients of numerator and denominator differ by more than doubles can hold. Scale the coefficients.', 'numerator')
  }
  return {
    gain,
    zeros: factorsFromPolynomials([{ polynomial: top, power: 1 }], sampled, 'numerator'),
    poles: factorsFromPolynomials([{ polynomial: bottom, power: 1 }], sampled, 'denominator'),
    deadTime: options.deadTime,
    ...(sampled ? { sampleTime: options.sampleTime } : {}),
  }
}

function readCoefficients(list: number[], path: 'numerator' | 'denominator'): ExactPolynomial {
  if (list.length === 0) throw new AnalysisInputError(`The ${path} is empty: give its coefficients, highest power first.`, path)
  list.forEach((value, k) => {
    if (!Number.isFinite(value)) throw new AnalysisInputError(`Coefficient ${k + 1} of the ${path} is not a finite number.`, `${path}[${k}]`)
  })
  const ascending = list.slice(list.findIndex(value => value !== 0)).reverse()
  if (list.every(value => value === 0)) {
    throw new AnalysisInputError(path === 'numerator'
      ? 'The numerator is zero: a loop gain of zero has no crossings to find.'
      : 'The denominator is zero: every coefficient is 0.', path)
  }
  return exactFromDoubles(ascending)
}
