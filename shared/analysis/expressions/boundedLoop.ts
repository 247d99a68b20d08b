import type { ExactLoop } from './ExactLoop'
import { expressionLimits } from './expressionLimits'
import { FactorProduct } from './FactorProduct'

/** The loop gain itself. @throws RangeError where it is beyond the limits on order and digits */
export function boundedLoop(loop: ExactLoop): ExactLoop {
  const degree = Math.max(
    FactorProduct.degree(loop.numerator) + FactorProduct.degree(loop.inverted),
    FactorProduct.degree(loop.denominator),
  )
  if (degree > expressionLimits.degree) throw new RangeError(`its order would be ${degree}, at most ${expressionLimits.degree} is read`)
  if (loop.scale.bits > expressionLimits.bits) throw new RangeError('its numbers have too many digits')
  return loop
}
