import { collectDelays } from './collectDelays'
import type { DelayedPolynomial, DelayedSum, ExactLoop } from './ExactLoop'
import { FactorProduct } from './FactorProduct'

/**
 * Sum of two loop gains over their common denominator, multiplied out exactly where terms share a dead time, factors common
 * to both kept as factors; null where the sum is zero.
 *
 * @throws RangeError when the result grows beyond the limits
 */
export function addLoops(a: ExactLoop, b: ExactLoop): ExactLoop | null {
  const left = mergeInverted(a)
  const right = mergeInverted(b)
  const denominator = FactorProduct.multiple(left.denominator, right.denominator)
  const shared = FactorProduct.common(left.numerator, right.numerator)
  const sums = sharedSums(left, right)
  const terms = collectDelays([
    ...remainder(left, denominator, shared, sums),
    ...remainder(right, denominator, shared, sums),
  ])
  if (terms.length === 0) return null
  let inner = terms[0]?.factors ?? FactorProduct.empty
  for (const term of terms) inner = FactorProduct.common(inner, term.factors)
  const first = terms[0] as DelayedPolynomial
  const result: ExactLoop = {
    scale: first.scale,
    delay: first.delay,
    numerator: FactorProduct.times(shared, inner),
    denominator,
    inverted: FactorProduct.empty,
    common: new Set(denominator.keys()),
    sums,
  }
  if (terms.length === 1) return result
  const reduced = terms.map(term => ({
    scale: term.scale.over(first.scale),
    factors: FactorProduct.without(term.factors, inner),
    delay: term.delay.minus(first.delay),
  }))
  const sum = { key: keyOf(reduced), terms: reduced }
  const known = sums.get(sum.key)
  return { ...result, sums: new Map(sums).set(sum.key, { sum, power: 1 + (known?.power ?? 0) }) }
}

function mergeInverted(loop: ExactLoop): ExactLoop {
  return { ...loop, numerator: FactorProduct.times(loop.numerator, loop.inverted), inverted: FactorProduct.empty }
}

/** Powers of sums common to both: the smaller power, negative ones counted as 0 where a sum is missing. */
function sharedSums(a: ExactLoop, b: ExactLoop): Map<string, { sum: DelayedSum, power: number }> {
  const shared = new Map<string, { sum: DelayedSum, power: number }>()
  for (const [key, { sum }] of [...a.sums, ...b.sums]) {
    const power = Math.min(a.sums.get(key)?.power ?? 0, b.sums.get(key)?.power ?? 0)
    if (power !== 0) shared.set(key, { sum, power })
  }
  return shared
}

/** What is left of a loop gain when the common denominator, factors and sums are taken out: a sum of polynomials with dead times. */
function remainder(loop: ExactLoop, denominator: ExactLoop['denominator'], shared: ExactLoop['numerator'], sums: Map<string, { sum: DelayedSum, power: number }>): DelayedPolynomial[] {
  let terms: DelayedPolynomial[] = [{
    scale: loop.scale,
    delay: loop.delay,
    factors: FactorProduct.times(
      FactorProduct.without(loop.numerator, shared),
      FactorProduct.without(denominator, loop.denominator),
    ),
  }]
  const times = (sum: DelayedSum, power: number) => {
    for (let repeat = 0; repeat < power; repeat++) {
      terms = collectDelays(terms.flatMap(term => sum.terms.map(factor => ({
        scale: term.scale.times(factor.scale),
        delay: term.delay.plus(factor.delay),
        factors: FactorProduct.times(term.factors, factor.factors),
      }))))
    }
  }
  for (const [key, { sum, power }] of loop.sums) times(sum, power - (sums.get(key)?.power ?? 0))
  for (const [key, { sum, power }] of sums) if (!loop.sums.has(key)) times(sum, -power)
  return terms
}

function keyOf(terms: DelayedPolynomial[]): string {
  return terms.map(({ scale, delay, factors }) => {
    const product = Array.from(factors, ([key, { power }]) => `(${key})^${power}`).sort().join('')
    return `${scale.numerator}/${scale.denominator}*${product}@${delay.numerator}/${delay.denominator}`
  }).join('+')
}
