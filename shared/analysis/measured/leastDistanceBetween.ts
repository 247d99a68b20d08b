/** The locus is taken to stay in the ellipse about two samples within which a detour is at most this many times the straight way. */
const longestDetour = 1.5

/**
 * A lower bound of |1 + L| between two samples A and B, given that the locus stays where |L - A| + |L - B| <= 1.5 |A - B|:
 * by the triangle inequality 2 |1 + L| >= |1 + A| + |1 + B| - 1.5 |A - B|. 0 where -1 may lie on either side of the locus.
 */
export function leastDistanceBetween(ar: number, ai: number, br: number, bi: number): number {
  const detour = longestDetour * Math.hypot(br - ar, bi - ai)
  return Math.max(0, (Math.hypot(1 + ar, ai) + Math.hypot(1 + br, bi) - detour) / 2)
}
