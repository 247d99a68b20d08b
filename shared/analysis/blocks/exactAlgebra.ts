import { Rational } from '../../numeric/extended/Rational'
import { addLoops } from '../expressions/addLoops'
import { boundedLoop } from '../expressions/boundedLoop'
import { constantLoop } from '../expressions/constantLoop'
import type { ExactLoop, FactorMap, FactorOrigin, PolynomialFactor } from '../expressions/ExactLoop'
import { excessDegree } from '../expressions/excessDegree'
import { FactorProduct } from '../expressions/FactorProduct'
import { invertLoop } from '../expressions/invertLoop'
import { multiplyLoops } from '../expressions/multiplyLoops'
import { raiseLoop } from '../expressions/raiseLoop'
import type { HoldBlock, LoopAlgebra } from './LoopAlgebra'

type TakenAsOne = (factor: PolynomialFactor, some: FactorOrigin, others: FactorOrigin) => void

const one = constantLoop(Rational.one) as ExactLoop

/**
 * Loop gains held exactly; `behindHold` works out the discrete equivalent of what stands behind a hold. `takenAsOne` is told of each pole of different blocks that is one of the
 * sum of two gains, or that a division by a sum cancels.
 */
export function exactAlgebra(behindHold: (continuous: ExactLoop, hold: HoldBlock) => ExactLoop, takenAsOne: TakenAsOne = () => {}): LoopAlgebra<ExactLoop> {
  const tell = (some: FactorMap, others: FactorMap) => {
    for (const [key, factor] of some) {
      const other = others.get(key)?.origin
      if (factor.origin && other && !factor.origin.blocks.some(block => other.blocks.includes(block))) takenAsOne(factor, factor.origin, other)
    }
  }
  return {
    number: value => ({ ...one, scale: value }),
    variable: () => ({ ...one, numerator: FactorProduct.of([0n, 1n]).factors }),
    scale: (value, by) => boundedLoop({ ...value, scale: value.scale.times(by) }),
    add: (a, b) => {
      tell(a.denominator, b.denominator)
      const sum = addLoops(a, b)
      return sum && boundedLoop(sum)
    },
    multiply: (a, b) => {
      tell(a.inverted, b.denominator)
      tell(b.inverted, a.denominator)
      return boundedLoop(multiplyLoops(a, b))
    },
    invert: invertLoop,
    raise: (value, exponent) => boundedLoop(raiseLoop(value, exponent)),
    delay: (value, delay) => delay.sign === 0 ? value : { ...value, delay: value.delay.plus(delay) },
    unitDelays: (count) => {
      if (count === 0) return one
      const power = FactorProduct.toPower(FactorProduct.of([0n, 1n]).factors, Math.abs(count))
      return boundedLoop(count > 0 ? { ...one, denominator: power } : { ...one, numerator: power })
    },
    behindHold,
    hasSeveralDelays: value => value.sums.size > 0,
    excess: excessDegree,
  }
}
