/** How many times the straight way the locus may take between two samples that show no sign of anything between. */
const detour = 1.5

/**
 * A lower bound of |1 + L| between two samples A and B, given that the locus stays in the ellipse |L - A| + |L - B| <= 1.5 |A - B|:
 * by the triangle inequality 2 |1 + L| >= |1 + A| + |1 + B| - 1.5 |A - B|. 0 where -1 may lie on either side of the locus.
 */
export function leastDistanceBetween(ar: number, ai: number, br: number, bi: number): number {
  return Math.max(0, (Math.hypot(1 + ar, ai) + Math.hypot(1 + br, bi) - detour * Math.hypot(br - ar, bi - ai)) / 2)
}
