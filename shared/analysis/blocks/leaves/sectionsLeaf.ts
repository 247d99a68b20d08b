import { Rational } from '../../../numeric/extended/Rational'
import type { SectionsGain } from '../../../types/block'
import { AnalysisInputError } from '../../AnalysisInputError'
import type { ExactLoop } from '../../expressions/ExactLoop'
import { multiplyLoops } from '../../expressions/multiplyLoops'
import { constantLoop } from '../../expressions/constantLoop'
import { quotient } from './quotient'
import { scaledPolynomialOfDoubles } from './scaledPolynomial'

/**
 * Second-order sections in z, exactly as coded: gain * prod (b0 + b1 z^-1 + b2 z^-2)/(a0 + a1 z^-1 + a2 z^-2).
 *
 * @throws AnalysisInputError with the path in the block, for a section with a0 = 0, which would need its own future output
 */
export function sectionsLeaf({ sections, gain }: SectionsGain): ExactLoop | null {
  let loop = constantLoop(Rational.fromDouble(gain))
  for (const [index, [b0, b1, b2, a0, a1, a2]] of sections.entries()) {
    if (a0 === 0) throw new AnalysisInputError(`Section ${index + 1} has a0 = 0: its output would depend on its own next value.`, `sections[${index}][3]`)
    const top = scaledPolynomialOfDoubles([b0, b1, b2])
    const section = top && quotient(top, scaledPolynomialOfDoubles([a0, a1, a2])!)
    loop = loop && section && multiplyLoops(loop, section)
  }
  return loop
}
