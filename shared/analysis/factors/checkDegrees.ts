import { AnalysisInputError } from '../AnalysisInputError'

/**
 * Refuses an improper loop gain: in s it grows without bound towards high frequency, in z it needs future samples.
 *
 * @throws AnalysisInputError naming `path`
 */
export function checkDegrees(numerator: number, denominator: number, sampled: boolean, path: string): void {
  if (numerator <= denominator) return
  throw new AnalysisInputError(sampled
    ? `Improper loop gain: the numerator has degree ${numerator}, the denominator only ${denominator}, so the loop would need future samples. Add poles at z = 0 or lower the numerator's degree.`
    : `Improper loop gain: the numerator has degree ${numerator}, the denominator only ${denominator}, so |L| grows without bound. Add the poles that limit it at high frequency.`, path)
}
