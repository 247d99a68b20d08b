import type { FactorList, FactoredLoop } from '../FactoredLoop'
import type { AxisLoop } from '../search/AxisLoop'
import { axisLoopFromFactors } from '../search/axisLoopFromFactors'
import { countUnstableZeros } from './countUnstableZeros'
import { DelayedSumOnAxis } from './DelayedSumOnAxis'
import { FarEnd } from './FarEnd'
import type { GeneralLoop } from './GeneralLoop'
import { originSeries } from './originSeries'
import { SumsOnAxis } from './SumsOnAxis'

/**
 * A loop gain with several dead times on the axis: its factors, and its sums as an extension. Zeros of the sums at s = 0 join the
 * integrators and differentiators; zeros beyond the boundary of sums that are divided by join the unstable poles, counted by their own encirclements
 * (which a loop gain that is only to be evaluated can do without).
 */
export function generalAxisLoop(loop: GeneralLoop, poles: 'counted' | 'not counted' = 'counted'): AxisLoop {
  const exactSums = [...loop.exact.sums.values()].map(entry => entry.sum)
  const origins = exactSums.map(originSeries)
  const sums = loop.sums.map((sum, i) => new DelayedSumOnAxis(loop, sum, origins[i]!))
  let atOrigin = 0
  let unstable = 0
  let openReason: string | undefined
  let smallest = Infinity
  let degree = 0
  const longestDelay = Math.max(...sums.map(sum => sum.longestDelay))
  loop.sums.forEach((sum, i) => {
    const order = origins[i]?.order ?? 0
    atOrigin += sum.power * order
    degree += sum.power * (sums[i]!.degree - order)
    if (origins[i]) smallest = Math.min(smallest, origins[i]!.reach / 1.5)
    if (sum.power > 0 || poles === 'not counted') return
    const count = countUnstableZeros(exactSums[i]!, order)
    if (typeof count === 'number') unstable += -sum.power * count
    else openReason = `an inner loop of the expression: ${count.reason}`
  })
  const rational = withOriginRoots(loop.rational, atOrigin)
  const axis = axisLoopFromFactors(rational)
  smallest = Math.min(smallest, axis.smallestRoot, 1 / longestDelay)
  let largest = Math.max(axis.largestRoot, 1 / longestDelay)
  for (const list of loop.polynomials) {
    for (let k = 0; k < list.re.length; k++) {
      const size = Math.hypot(list.re[k]!, list.im[k]!)
      if (size > 0) smallest = Math.min(smallest, size)
      largest = Math.max(largest, size)
    }
  }
  const total = axis.degree + degree
  const farEnd = new FarEnd(axisLoopFromFactors(loop.rational), loop, total, longestDelay)
  return {
    ...axis,
    degree: total,
    unstablePoles: axis.unstablePoles + unstable,
    smallestRoot: smallest,
    largestRoot: largest,
    extension: new SumsOnAxis(sums, farEnd, openReason),
  }
}

/** The factors with `order` more zeros (or, below 0, poles) at s = 0; a pole and a zero there cancel, as in (1 - exp(-sT))/s. */
function withOriginRoots(loop: FactoredLoop, order: number): FactoredLoop {
  if (order === 0) return loop
  const against = order > 0 ? loop.poles : loop.zeros
  const taken = Math.min(Math.abs(order), countAtOrigin(against))
  const shortened = withoutOrigin(against, taken)
  const lengthened = withOrigin(order > 0 ? loop.zeros : loop.poles, Math.abs(order) - taken)
  return order > 0 ? { ...loop, zeros: lengthened, poles: shortened } : { ...loop, zeros: shortened, poles: lengthened }
}

function countAtOrigin(list: FactorList): number {
  let count = 0
  for (let k = 0; k < list.re.length; k++) if (list.re[k] === 0 && list.im[k] === 0) count++
  return count
}

function withoutOrigin(list: FactorList, count: number): FactorList {
  let left = count
  const kept = Array.from(list.re, (_, k) => k).filter(k => !(list.re[k] === 0 && list.im[k] === 0 && left-- > 0))
  return {
    re: Float64Array.from(kept, k => list.re[k]!),
    im: Float64Array.from(kept, k => list.im[k]!),
    correction: Float64Array.from(kept, k => list.correction[k]!),
    onBoundary: Uint8Array.from(kept, k => list.onBoundary[k]!),
  }
}

function withOrigin(list: FactorList, count: number): FactorList {
  const more = new Array<number>(count).fill(0)
  return {
    re: Float64Array.from([...list.re, ...more]),
    im: Float64Array.from([...list.im, ...more]),
    correction: Float64Array.from([...list.correction, ...more]),
    onBoundary: Uint8Array.from([...list.onBoundary, ...more.map(() => 1)]),
  }
}
