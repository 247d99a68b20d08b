import { Rational } from '../../numeric/extended/Rational'
import { constantLoop } from './constantLoop'
import type { ExactLoop } from './ExactLoop'
import { FactorProduct } from './FactorProduct'
import { invertLoop } from './invertLoop'

/** L to a whole power. */
export function raiseLoop(loop: ExactLoop, exponent: number): ExactLoop {
  if (exponent < 0) return raiseLoop(invertLoop(loop), -exponent)
  if (exponent === 0) return constantLoop(Rational.one) as ExactLoop
  return {
    scale: loop.scale.toPower(exponent),
    delay: loop.delay.times(Rational.of(BigInt(exponent), 1n)),
    numerator: FactorProduct.toPower(loop.numerator, exponent),
    denominator: FactorProduct.toPower(loop.denominator, exponent),
    inverted: FactorProduct.toPower(loop.inverted, exponent),
    common: loop.common,
    sums: new Map(Array.from(loop.sums, ([key, { sum, power }]) => [key, { sum, power: power * exponent }])),
  }
}
