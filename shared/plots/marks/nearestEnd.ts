import type { LoopAnalysis, VectorMargin } from '../../types/analysis'

/**
 * The vector margin of a loop that comes nearest to -1 at an end of its axis or band, where no closest approach is listed; null where one of the
 * approaches is the nearest.
 */
export function nearestEnd({ vectorMargin, closestApproaches }: LoopAnalysis): VectorMargin | null {
  if (!vectorMargin) return null
  return closestApproaches.every(({ distance }) => distance > vectorMargin.distance * (1 + 1e-9)) ? vectorMargin : null
}
