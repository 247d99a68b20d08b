import { BlockScope } from '#shared/analysis/blocks/BlockScope'
import { exactLeafSource } from '#shared/analysis/blocks/exactLeafSource'
import type { ExactLoop } from '#shared/analysis/expressions/ExactLoop'

/** A typed continuous gain, held exactly. */
export function exactOf(expression: string): ExactLoop {
  const scope = new BlockScope({ expression }, exactLeafSource())
  const part = scope.evaluate()
  if (!part) throw new Error('the gain is zero')
  return scope.arithmetic.settle(part, 0).value
}
