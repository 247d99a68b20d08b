import { Rational } from '../../numeric/extended/Rational'
import { AnalysisInputError } from '../AnalysisInputError'
import { roundingAt, type LowestDistance } from '../margins/findLowestDistance'
import type { AxisLoop } from '../search/AxisLoop'
import { axisLoopFromFactors } from '../search/axisLoopFromFactors'
import { searchLoop, type SearchResult } from '../search/searchLoop'
import { judgeStability } from '../stability/judgeStability'
import { addLoops } from './addLoops'
import { constantLoop } from './constantLoop'
import type { DelayedSum, ExactLoop } from './ExactLoop'
import { FactorProduct } from './FactorProduct'
import { generalAxisLoop } from './generalAxisLoop'
import { generalLoopFromExact } from './generalLoopFromExact'
import { invertLoop } from './invertLoop'
import { multiplyLoops } from './multiplyLoops'
import { raiseLoop } from './raiseLoop'
import { rationalPart } from './rationalPart'

const MAX_EFFORT = 100_000
/** Only where |M| is near 1 can it come near -1: minima where it is smaller are of no interest. */
const LOW_FLOOR = Math.log(0.95)

/**
 * Zeros beyond the imaginary axis of a sum of different dead times Q(s) whose undelayed term P_0 has the highest degree, the zero of order m at
 * s = 0 not counted; or why they cannot be told.
 *
 * Q ((s+a)/s)^m = P_0 (1 + M): its zeros beyond the axis are the unstable closed-loop poles of the loop gain M, which are counted by the encirclements
 * of M like those of any loop (argument principle; R. Bellman, K. L. Cooke, Differential-Difference Equations, 1963, chapter 12).
 */
export function countUnstableZeros(sum: DelayedSum, order: number): number | { reason: string } {
  const main = sum.terms[0]!
  const one = constantLoop(Rational.one)!
  const whole: ExactLoop = { ...one, sums: new Map([[sum.key, { sum, power: 1 }]]) }
  const undelayed: ExactLoop = { ...one, scale: main.scale, numerator: main.factors }
  const variable: ExactLoop = { ...one, numerator: FactorProduct.of([0n, 1n]).factors }
  const atOrigin = raiseLoop(variable, order)
  const beside = addLoops(variable, { ...one, scale: cornerOf(sum) })!
  const divisor = multiplyLoops(atOrigin, undelayed)
  const difference = addLoops(multiplyLoops(whole, raiseLoop(beside, order)), { ...divisor, scale: divisor.scale.negated() })
  const loop = difference === null
    ? null
    : multiplyLoops(difference, invertLoop(divisor))
  try {
    if (loop === null) return { reason: 'its dead times cancel' }
    const factored = loop.sums.size === 0 ? rationalPart(loop, undefined) : null
    const axis = factored ? axisLoopFromFactors(factored) : generalAxisLoop(generalLoopFromExact(loop, 0))
    const result = searchLoop(axis, { floorLog: LOW_FLOOR, maxFinds: 10_000, maxEffort: MAX_EFFORT })
    const stability = judgeStability(factored, result, nearestApproach(axis, result))
    if (stability.verdict === 'marginal') return { reason: 'it has poles on the stability boundary, or so near that rounding hides the side' }
    if (stability.closedLoopUnstablePoles === null) return { reason: stability.reason ?? 'its poles cannot be counted' }
    return stability.closedLoopUnstablePoles
  }
  catch (error) {
    if (error instanceof AnalysisInputError) return { reason: error.message }
    throw error
  }
}

/** The minimum of |1 + M| that lies deepest against its rounding. */
function nearestApproach(axis: AxisLoop, { distance }: SearchResult): LowestDistance {
  let nearest: LowestDistance = { distance: Infinity, v: 0, rounding: 0 }
  distance.v.forEach((v, k) => {
    const size = Math.exp(distance.logGain[k]!)
    const found = Math.hypot(1 + size * Math.cos(distance.phase[k]!), size * Math.sin(distance.phase[k]!))
    if (found > 1e-6) return
    const rounding = roundingAt(axis, v)
    if (found - rounding < nearest.distance - nearest.rounding) nearest = { distance: found, v, rounding }
  })
  return nearest
}

/** A corner a of about the inverse of the longest dead time. */
function cornerOf(sum: DelayedSum): Rational {
  const longest = Math.max(...sum.terms.map(term => term.delay.toNumber()))
  return Rational.fromDouble(2 ** -Math.round(Math.log2(longest)))
}
