import { addProduct, ComplexResolvent } from '../../numeric/linear/ComplexResolvent'
import { factoredValue } from './factoredValue'
import { REDUCTION_ROUNDING } from './perturbationAt'
import type { PreciseRoot } from './rootList'
import type { ChannelFactors, StateSpaceModel } from './StateSpaceModel'

/** How far the factors of a channel may be from its matrices on the axis, relative. */
export interface ChannelAccuracy {
  relative: number
  /** the same in words: what it rests on */
  basis: string
}

const MOST_POINTS = 24
const FEWEST_POINTS = 6
/** A correction this large beside its root comes of a cluster. */
const CLUSTERED = 1e-20
/** Operations the check may take. */
const EFFORT = 2e7

/**
 * Compares the factors with the matrices at frequencies of the poles and zeros of the channel, spread over their range: there the response is found anew from the matrices (triangular factors in
 * doubles, residuals in double-double). With it goes the bound of the backward error of the reduction, |y| |x| |A| 60 n 2^-104 with x = (sI - A)^-1 b and y' = c' (sI - A)^-1, and
 * of the roots' corrections. The larger of the two, over all these frequencies.
 */
export function channelAccuracy(model: StateSpaceModel, output: number, input: number, { gain, zeros, poles }: ChannelFactors): ChannelAccuracy {
  const n = model.states
  const points = checkPoints(zeros, poles, model)
  const { b, c, d: direct, norm } = model.matrices(output, input)
  let bound = 0
  let difference = 0
  for (const { re, im } of points) {
    const resolvent = new ComplexResolvent(model.a, re, im)
    const x = resolvent.solvePrecisely(b)
    const y = resolvent.solveTransposed(c)
    const sumRe = new Float64Array([direct, 0])
    const sumIm = new Float64Array(2)
    let xSize = 0
    let ySize = 0
    for (let i = 0; i < n; i++) {
      addProduct(sumRe, c[i]!, x.re[i]!, x.reLow[i]!)
      addProduct(sumIm, c[i]!, x.im[i]!, x.imLow[i]!)
      xSize += x.re[i]! ** 2 + x.im[i]! ** 2
      ySize += y.re[i]! ** 2 + y.im[i]! ** 2
    }
    const size = Math.hypot(sumRe[0]!, sumIm[0]!)
    const value = factoredValue(gain.high, zeros, poles, re, im)
    difference = Math.max(difference, Math.hypot(value.re - sumRe[0]!, value.im - sumIm[0]!) / size)
    bound = Math.max(bound, REDUCTION_ROUNDING * n * norm * Math.sqrt(xSize * ySize) / size + corrections(zeros, re, im) + corrections(poles, re, im))
  }
  const relative = Math.max(bound, difference)
  return {
    relative: Number.isNaN(relative) ? Infinity : relative,
    basis: `state space of ${n} ${n === 1 ? 'state' : 'states'} reduced in double-double arithmetic (bound of its backward error ${bound.toExponential(0)}), compared with the matrices themselves at ${points.length === 1 ? 'one frequency' : `${points.length} frequencies`} (largest difference ${difference.toExponential(0)})`,
  }
}

function corrections(roots: readonly PreciseRoot[], re: number, im: number): number {
  let sum = 0
  for (const root of roots) if (root.correction > 0 && !isClustered(root)) sum += root.correction / Math.hypot(re - root.re, im - root.im)
  return sum
}

/** Roots so close that rounding hides which is which: each by itself is worth little, their product is right. It is asked for where they are, not bounded by their corrections. */
function isClustered({ re, im, correction }: PreciseRoot): boolean {
  return correction > CLUSTERED * Math.hypot(re, im)
}

/** Points of the axis beside poles and zeros, from the lowest to the highest. */
function checkPoints(zeros: readonly PreciseRoot[], poles: readonly PreciseRoot[], model: StateSpaceModel): { re: number, im: number }[] {
  const frequencies = new Set<number>()
  const clustered = new Set<number>()
  for (const root of [...poles, ...zeros.filter(zero => Math.hypot(zero.re, zero.im) <= 4 * model.reach)]) {
    const w = model.sampled ? Math.abs(Math.atan2(root.im, root.re)) : Math.hypot(root.re, root.im)
    if (w > 0) (isClustered(root) ? clustered : frequencies).add(w)
  }
  const sorted = [...frequencies].sort((p, q) => p - q)
  if (sorted.length === 0 && clustered.size === 0) sorted.push(1)
  const wanted = Math.max(FEWEST_POINTS, Math.min(MOST_POINTS, Math.floor(EFFORT / Math.max(1, model.states) ** 3)))
  const count = Math.min(wanted, sorted.length)
  const chosen = Array.from({ length: count }, (_, k) => sorted[count === 1 ? 0 : Math.round(k * (sorted.length - 1) / (count - 1))]!)
  // a little beside each, so that no undamped root is met
  return [...chosen, ...[...clustered].slice(0, wanted)].map(w => 1.0009765625 * w).map(w => model.sampled ? { re: Math.cos(w), im: Math.sin(w) } : { re: 0, im: w })
}
