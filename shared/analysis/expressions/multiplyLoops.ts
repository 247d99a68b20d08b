import type { DelayedSum, ExactLoop } from './ExactLoop'
import { FactorProduct } from './FactorProduct'

/**
 * Product of two loop gains; only factors that a division by a sum has inverted cancel (see ExactLoop), and those only with poles of the other one:
 * where its own sum has them on both sides, they are modes hidden inside, as those of P in 1/(1 + Q*P), which no feedback moves.
 */
export function multiplyLoops(a: ExactLoop, b: ExactLoop): ExactLoop {
  const ofB = FactorProduct.common(a.inverted, b.denominator)
  const ofA = FactorProduct.common(b.inverted, a.denominator)
  const sums = new Map<string, { sum: DelayedSum, power: number }>(a.sums)
  for (const [key, { sum, power }] of b.sums) {
    const total = power + (a.sums.get(key)?.power ?? 0)
    if (total === 0) sums.delete(key)
    else sums.set(key, { sum, power: total })
  }
  return {
    scale: a.scale.times(b.scale),
    delay: a.delay.plus(b.delay),
    numerator: FactorProduct.times(a.numerator, b.numerator),
    denominator: FactorProduct.times(FactorProduct.without(a.denominator, ofA), FactorProduct.without(b.denominator, ofB)),
    inverted: FactorProduct.times(FactorProduct.without(a.inverted, ofB), FactorProduct.without(b.inverted, ofA)),
    common: new Set([...a.common, ...b.common]),
    sums,
  }
}
