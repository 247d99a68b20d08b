import type { ExactLoop, PolynomialFactor } from './ExactLoop'
import { FactorProduct } from './FactorProduct'

/** 1 / L. What was the common denominator of a sum may cancel from now on. */
export function invertLoop(loop: ExactLoop): ExactLoop {
  const plain = new Map<string, PolynomialFactor>()
  const inverted = new Map<string, PolynomialFactor>()
  for (const [key, factor] of loop.denominator) (loop.common.has(key) ? inverted : plain).set(key, factor)
  return {
    scale: loop.scale.toPower(-1),
    delay: loop.delay.negated(),
    numerator: plain,
    denominator: FactorProduct.times(loop.numerator, loop.inverted),
    inverted,
    common: new Set(),
    sums: new Map(Array.from(loop.sums, ([key, { sum, power }]) => [key, { sum, power: -power }])),
  }
}
