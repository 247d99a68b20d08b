import type { DelayedSum, ExactLoop } from './ExactLoop'
import { FactorProduct } from './FactorProduct'

/** Product of two loop gains; only factors that a division by a sum has inverted cancel (see ExactLoop). */
export function multiplyLoops(a: ExactLoop, b: ExactLoop): ExactLoop {
  const inverted = FactorProduct.times(a.inverted, b.inverted)
  const denominator = FactorProduct.times(a.denominator, b.denominator)
  const cancelling = FactorProduct.common(inverted, denominator)
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
    denominator: FactorProduct.without(denominator, cancelling),
    inverted: FactorProduct.without(inverted, cancelling),
    common: new Set([...a.common, ...b.common]),
    sums,
  }
}
