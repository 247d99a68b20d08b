import type { AxisLoop } from './AxisLoop'

/** What is the same over whole stretches of the axis, told from the places of the roots before any search. */
export interface AxisTies {
  /** |L| is the same everywhere: every root has its mirror image of the other kind (all-pass). */
  constantGain: boolean
  /** L is real everywhere: every root has its mirror image of the same kind, or lies on the axis, and there is no dead time. */
  real: boolean
}

/** Roots count as mirror images when they differ by less than this part of their distance from the axis. */
const MIRROR = 1e-11

export function recogniseTies(axis: AxisLoop): AxisTies {
  let constantGain = axis.originWeight === 0 && axis.boundary.length === 0
  let real = axis.deadTime === 0 && axis.delayInSamples === 0
  const done = new Uint8Array(axis.count)
  for (let k = 0; k < axis.count && (constantGain || real); k++) {
    if (done[k] === 1) continue
    const a = Math.abs(axis.re[k]!)
    if (a === 0) continue
    let gain = 0
    let turn = 0
    for (let i = k; i < axis.count; i++) {
      if (Math.abs(Math.abs(axis.re[i]!) - a) > MIRROR * a || Math.abs(axis.im[i]! - axis.im[k]!) > MIRROR * a) continue
      done[i] = 1
      gain += axis.weight[i]!
      turn += axis.weight[i]! * Math.sign(axis.re[i]!)
    }
    // Rounding of fractional weights; whole ones are exact.
    if (Math.abs(gain) > 1e-12) constantGain = false
    if (Math.abs(turn) > 1e-12) real = false
  }
  return { constantGain, real }
}
