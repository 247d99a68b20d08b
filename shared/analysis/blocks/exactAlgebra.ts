import { Rational } from '../../numeric/extended/Rational'
import { addLoops } from '../expressions/addLoops'
import { boundedLoop } from '../expressions/boundedLoop'
import { constantLoop } from '../expressions/constantLoop'
import type { ExactLoop } from '../expressions/ExactLoop'
import { excessDegree } from '../expressions/excessDegree'
import { FactorProduct } from '../expressions/FactorProduct'
import { invertLoop } from '../expressions/invertLoop'
import { multiplyLoops } from '../expressions/multiplyLoops'
import { raiseLoop } from '../expressions/raiseLoop'
import type { HoldBlock, LoopAlgebra } from './LoopAlgebra'

const one = constantLoop(Rational.one) as ExactLoop

/** Loop gains held exactly; `behindHold` works out the discrete equivalent of what stands behind a hold. */
export function exactAlgebra(behindHold: (continuous: ExactLoop, hold: HoldBlock) => ExactLoop): LoopAlgebra<ExactLoop> {
  return {
    number: value => ({ ...one, scale: value }),
    variable: () => ({ ...one, numerator: FactorProduct.of([0n, 1n]).factors }),
    scale: (value, by) => boundedLoop({ ...value, scale: value.scale.times(by) }),
    add: (a, b) => {
      const sum = addLoops(a, b)
      return sum && boundedLoop(sum)
    },
    multiply: (a, b) => boundedLoop(multiplyLoops(a, b)),
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
