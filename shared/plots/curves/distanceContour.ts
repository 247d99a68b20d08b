/** One point in the plane of gain over phase. */
export interface GainPhasePoint {
  /** deg from the critical point */
  phase: number
  /** dB */
  gain: number
}

const steps = 80

/**
 * The line of equal distance to -1 in the plane of gain over phase: L = -1 + d exp(j a), closed for d < 1. The circle of d = 1 passes through L = 0 and
 * is cut at `lowest` (dB).
 */
export function distanceContour(distance: number, lowest: number): GainPhasePoint[] {
  const points: GainPhasePoint[] = []
  const gap = distance >= 1 ? 10 ** (lowest / 20) : 0
  for (let i = 0; i <= steps; i++) {
    // From just past the origin, once around, to just before it.
    const angle = gap + (2 * Math.PI - 2 * gap) * i / steps
    const [re, im] = [-1 + distance * Math.cos(angle), distance * Math.sin(angle)]
    points.push({
      // measured from -1's own direction, so that it does not jump there
      phase: -Math.atan2(im, -re) * 180 / Math.PI,
      gain: Math.max(lowest, 20 * Math.log10(Math.hypot(re, im))),
    })
  }
  return points
}
