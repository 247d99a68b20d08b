import type { SamplePoint } from './SamplePoint'

/** px per degree of phase in a figure of usual size. */
const phaseScale = 0.8

/** Distance of the point (px, py) from the segment between (0, 0) and (bx, by), all in px. */
function fromSegment(px: number, py: number, bx: number, by: number): number {
  const length2 = bx * bx + by * by
  let t = length2 > 0 ? (px * bx + py * by) / length2 : 0
  t = t < 0 ? 0 : t > 1 ? 1 : t
  const dx = px - t * bx
  const dy = py - t * by
  return Math.sqrt(dx * dx + dy * dy)
}

/**
 * How far point m lies from the chord between a and b in the worst of the views in which a loop gain is drawn (px of a figure
 * of usual size): gain, phase and return difference over frequency, gain over phase, and the neighbourhood of -1.
 * `phaseAM`, `phaseAB`: unwrapped phase of m and of b less that of a, deg.
 */
export function viewError(a: SamplePoint, m: SamplePoint, b: SamplePoint, phaseAM: number, phaseAB: number): number {
  const mx = m.x - a.x
  const bx = b.x - a.x
  const mg = m.gain - a.gain
  const bg = b.gain - a.gain
  const mp = phaseAM * phaseScale
  const bp = phaseAB * phaseScale
  const near = Math.min(a.nearScale, m.nearScale, b.nearScale)
  return Math.max(
    fromSegment(mx, mg, bx, bg),
    fromSegment(mx, mp, bx, bp),
    fromSegment(mx, m.distance - a.distance, bx, b.distance - a.distance),
    fromSegment(mp, mg, bp, bg),
    fromSegment((m.re - a.re) * near, (m.im - a.im) * near, (b.re - a.re) * near, (b.im - a.im) * near),
  )
}
