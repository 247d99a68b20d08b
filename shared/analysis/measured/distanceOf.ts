import type { CurvePoint } from './curveAt'

/** |1 + L| from log L, without cancellation where L is near -1 in size. */
export function distanceOf({ gain, phase }: CurvePoint): number {
  const size = Math.exp(gain)
  const half = Math.cos(phase / 2)
  // (1 - |L|)^2 + 4 |L| cos^2(phase / 2) is |1 + L|^2.
  return Math.hypot(Math.expm1(gain), 2 * Math.sqrt(size) * half)
}
