/**
 * Radius of the 95 % confidence circle of a measured frequency response, as a ratio of its magnitude:
 * sqrt((a^(-1/(n-1)) - 1) (1 - g2) / g2) with a = 0.05, ordinary coherence g2 and n averages. Infinity where the data bound nothing
 * (one average, coherence 0).
 *
 * The F-distribution form sqrt(F(2, 2n-2; a) / (n-1) (1 - g2) / g2) is the same, for F(2, m; a) has this closed form.
 * Source (from memory): J. S. Bendat, A. G. Piersol, Random Data, ch. 9; the circle is also that of ISO 7626-2.
 */
export function confidenceRadius(coherence: number, averages: number): number {
  if (averages < 2 || coherence <= 0) return Infinity
  // expm1 keeps the digits when there are many averages.
  return Math.sqrt(Math.expm1(-Math.log(0.05) / (averages - 1)) * (1 - coherence) / coherence)
}
