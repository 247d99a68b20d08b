import { polynomialRoots } from '../../numeric/extended/polynomialRoots'
import type { FactoredLoop } from '../FactoredLoop'
import { closedLoopRoots } from '../factors/closedLoopRoots'
import { exactClosedLoopPolynomial } from '../factors/exactClosedLoopPolynomial'
import { ReturnDifferenceNumerator } from '../factors/ReturnDifferenceNumerator'

/** Relative width of the discs about the roots below which plain doubles on the factors are good enough. */
const NARROW = 1e-9

/**
 * Closed-loop poles of a loop gain in factors, those of the upper half plane and of the real axis: from the factors in doubles where their discs
 * are narrow and clear of each other's, otherwise from the exact expansion. `samples`: dead time, each one a pole at z = 0.
 * @throws RangeError where poles lie closer together than doubles can hold
 */
export function preciseClosedLoopRoots(loop: FactoredLoop, samples: number): { re: number, im: number }[] {
  const quick = closedLoopRoots(new ReturnDifferenceNumerator(loop, samples))
  const upper = quick && upperHalf(quick, loop.sampleTime !== undefined)
  if (upper) return upper
  const { re, im } = polynomialRoots(exactClosedLoopPolynomial(loop, samples), loop.sampleTime !== undefined)
  return Array.from(re, (x, k) => ({ re: x, im: im[k]! })).filter(root => root.im >= 0)
}

/** Null where a disc is too wide to tell a real root from a pair. */
function upperHalf({ re, im, radius }: { re: Float64Array, im: Float64Array, radius: Float64Array }, sampled: boolean): { re: number, im: number }[] | null {
  const kept: { re: number, im: number }[] = []
  let above = 0
  let below = 0
  for (let k = 0; k < re.length; k++) {
    const [x, y, reach] = [re[k]!, im[k]!, radius[k]!]
    // In z what tells frequency and damping is how far a root lies from 1.
    if (!(reach <= NARROW * Math.min(Math.hypot(x, y), sampled ? Math.hypot(x - 1, y) : Infinity))) return null
    for (let j = 0; j < k; j++) {
      if (Math.hypot(x - re[j]!, y - im[j]!) <= reach + radius[j]!) return null
    }
    // A disc of one root that meets its own mirror image holds a real root.
    const real = Math.abs(y) <= reach
    if (!real && y > 0) above++
    if (!real && y < 0) below++
    if (real || y > 0) kept.push({ re: x, im: real ? 0 : y })
  }
  return above === below ? kept : null
}
