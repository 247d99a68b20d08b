import type { FactoredLoop } from '../FactoredLoop'
import { ReturnDifferenceNumerator } from '../factors/ReturnDifferenceNumerator'
import { settleRoots } from '../factors/settleRoots'
import { startOfRootLoci } from './startOfRootLoci'

/** Roots may move by this part of the distance to their nearest neighbour in one step. */
const SAFE_MOVE = 0.25
/** Steps of ln(gain). */
const FIRST_STEP = 0.5
const LONGEST_STEP = 2
const SHORTEST_STEP = 1e-4
const MOST_STEPS = 3000

export interface LocusEnd {
  re: number
  im: number
  /** index of the open-loop poles it goes back to, one of each conjugate pair; several where loci met on the way and cannot be told apart */
  origins: number[]
}

/**
 * Follows every root locus of D + k N (W. R. Evans, 'Graphical analysis of control systems', 1948) from the open-loop poles at k near 0 to k = 1, all at
 * once, by steps of ln k so small that no root moves farther than a quarter of the way to its neighbour. Where loci meet, steps end at a least one:
 * the roots that met then share their origins. Null where the loci cannot be followed.
 *
 * `poles` are those of the loop and `samples` more at z = 0; `canonical[k]` is the index that pole k and its conjugate are known by.
 */
export function followRootLoci(loop: FactoredLoop, samples: number, canonical: readonly number[]): LocusEnd[] | null {
  const start = startOfRootLoci(loop, samples, canonical)
  if (start === null) return null
  let { re, im } = start
  const origins = start.origins.map(index => new Set([index]))
  let logGain = Math.log(start.gain)
  let step = FIRST_STEP
  for (let count = 0; logGain < 0; count++) {
    if (count === MOST_STEPS) return null
    const last = logGain + step >= 0
    const next = last ? 0 : logGain + step
    const moved = rootsAt(loop, samples, Math.exp(next), re, im)
    const met = moved === null ? null : rootsThatMayHaveMet(re, im, moved.re, moved.im)
    if (moved === null || (met!.length > 0 && step > SHORTEST_STEP)) {
      step /= 4
      if (step < SHORTEST_STEP / 100) return null
      continue
    }
    for (const group of met!) shareOrigins(origins, group)
    ;({ re, im } = moved)
    logGain = next
    step = Math.min(LONGEST_STEP, step * 2)
  }
  return Array.from(re, (x, k) => ({ re: x, im: im[k]!, origins: [...origins[k]!].sort((a, b) => a - b) }))
}

function rootsAt(loop: FactoredLoop, samples: number, gain: number, fromRe: Float64Array, fromIm: Float64Array) {
  const re = fromRe.slice()
  const im = fromIm.slice()
  for (let k = 0; k < re.length; k++) {
    // Off the real axis, which the iteration could not leave by itself; by less for those with near neighbours.
    const shift = 1e-3 * gapBeside(fromRe, fromIm, k) * Math.cos(2.4 * k)
    im[k] = im[k]! + (Number.isFinite(shift) ? shift : 1e-3 * Math.abs(re[k]!))
  }
  const sum = new ReturnDifferenceNumerator({ ...loop, gain: loop.gain * gain }, samples)
  return settleRoots(sum, re, im) ? { re, im } : null
}

/** Pairs of roots, by index, of which one moved too far for its identity to be certain. */
function rootsThatMayHaveMet(re: Float64Array, im: Float64Array, nextRe: Float64Array, nextIm: Float64Array): [number, number][] {
  const pairs: [number, number][] = []
  for (let k = 0; k < re.length; k++) {
    const move = Math.hypot(nextRe[k]! - re[k]!, nextIm[k]! - im[k]!)
    const [before, after] = [nearestTo(re, im, k), nearestTo(nextRe, nextIm, k)]
    if (before >= 0 && move > SAFE_MOVE * Math.hypot(re[k]! - re[before]!, im[k]! - im[before]!)) pairs.push([k, before])
    if (after >= 0 && move > SAFE_MOVE * Math.hypot(nextRe[k]! - nextRe[after]!, nextIm[k]! - nextIm[after]!)) pairs.push([k, after])
  }
  return pairs
}

function shareOrigins(origins: Set<number>[], [one, other]: [number, number]): void {
  const shared = new Set([...origins[one]!, ...origins[other]!])
  origins[one] = shared
  origins[other] = new Set(shared)
}

function nearestTo(re: Float64Array, im: Float64Array, k: number): number {
  let nearest = -1
  let least = Infinity
  for (let j = 0; j < re.length; j++) {
    if (j === k) continue
    const distance = Math.hypot(re[k]! - re[j]!, im[k]! - im[j]!)
    if (distance < least) [nearest, least] = [j, distance]
  }
  return nearest
}

function gapBeside(re: Float64Array, im: Float64Array, k: number): number {
  const nearest = nearestTo(re, im, k)
  return nearest < 0 ? Infinity : Math.hypot(re[k]! - re[nearest]!, im[k]! - im[nearest]!)
}
