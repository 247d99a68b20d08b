import type { PlanePole } from './describeOpenLoopPole'

/** |z| below which a pole is taken for one at 0: it settles within its sample to the precision of doubles. */
const SETTLED = 2 ** -53

/**
 * A root of the loop's variable in the plane of s, rad/s: itself, or ln(z)/T of a sampled loop. One at z = 0 has no logarithm; it is put where
 * |z| = 2^-53.
 */
export function poleInPlane(re: number, im: number, sampleTime: number | undefined): PlanePole {
  if (sampleTime === undefined) return { re, im, atOriginOfZ: false }
  const size = Math.hypot(re, im)
  if (size < SETTLED) return { re: Math.log(SETTLED) / sampleTime, im: 0, atOriginOfZ: true }
  // ln |z| without the rounding of |z| near 1
  const excess = (Math.abs(re) - 1) * (Math.abs(re) + 1) + im * im
  const log = Math.abs(excess) < 0.5 ? 0.5 * Math.log1p(excess) : Math.log(size)
  return { re: log / sampleTime, im: Math.atan2(im, re) / sampleTime, atOriginOfZ: false }
}
