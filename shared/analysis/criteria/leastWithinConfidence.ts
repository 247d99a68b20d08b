import type { ConfidenceDisc, LoopAnalysis } from '../../types/analysis'
import type { SmallestMargin } from './SmallestMargin'

/**
 * The smallest value a margin can have when the loop gain at its driver lies anywhere in the 95 % confidence disc of the two
 * samples beside it (the larger of the two). The value itself where the response carries no discs.
 *
 * With radius r: at L = -a the gain may rise to a + r and fall from a - r; at |L| = 1 the phase is off by at most asin r;
 * the distance to -1 by r.
 */
export function leastWithinConfidence(margin: SmallestMargin, analysis: LoopAnalysis): number | null {
  const { value, driver } = margin
  if (value === null || driver === null || driver.frequency === 'infinity' || analysis.discs === undefined) return value
  const radius = radiusAt(analysis.discs, driver.frequency)
  if (radius === 0) return value
  switch (margin.quantity) {
    case 'vectorMargin': return Math.max(0, value - radius)
    case 'gainMargin': {
      const size = 10 ** ((margin.direction === 'rise' ? -value : value) / 20)
      const moved = margin.direction === 'rise' ? size + radius : size - radius
      return moved > 0 ? Math.max(0, (margin.direction === 'rise' ? -20 : 20) * Math.log10(moved)) : 0
    }
    case 'phaseMargin': return Math.max(0, value - angleOf(radius) * 180 / Math.PI)
    case 'delayMargin': return Math.max(0, value - angleOf(radius) / (driver.frequency * (analysis.frequencyUnit === 'Hz' ? 2 * Math.PI : 1)))
  }
}

const angleOf = (radius: number) => radius < 1 ? Math.asin(radius) : Math.PI

/** The larger radius of the samples on both sides of a frequency, Infinity where one of them is not bounded. */
function radiusAt(discs: ConfidenceDisc[], frequency: number): number {
  let [low, high] = [0, discs.length - 1]
  if (high < 0) return 0
  while (low + 1 < high) {
    const middle = (low + high) >> 1
    if (discs[middle]!.frequency <= frequency) low = middle
    else high = middle
  }
  return Math.max(discs[low]!.radius ?? Infinity, discs[high]!.radius ?? Infinity)
}
