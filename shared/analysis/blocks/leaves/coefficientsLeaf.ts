import type { CoefficientsGain } from '../../../types/block'
import { AnalysisInputError } from '../../AnalysisInputError'
import type { ExactLoop } from '../../expressions/ExactLoop'
import { quotient } from './quotient'
import { scaledPolynomialOfDoubles } from './scaledPolynomial'

/** A block given by its coefficients, highest power first, exactly. @throws AnalysisInputError with the path in the block */
export function coefficientsLeaf({ numerator, denominator }: CoefficientsGain): ExactLoop | null {
  const top = scaledPolynomialOfDoubles(numerator)
  const bottom = scaledPolynomialOfDoubles(denominator)
  if (!bottom) throw new AnalysisInputError('denominator is zero: every coefficient in it is 0.', 'denominator')
  return top && quotient(top, bottom)
}
