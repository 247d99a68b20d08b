import type { CoverageException } from '../../types/analysis'
import type { SmallestMargin } from './SmallestMargin'

/**
 * The smallest margin that may hide in a stretch which could not be searched, given only that |1 + L| is at least d there
 * (0 where nothing is known): -20 log10(1 - d) dB of rise, 20 log10(1 + d) dB of fall, 2 asin(d / 2) of lag or lead, and that
 * angle over the highest frequency of the stretch as a delay. Closed form: a crossing at -a has |1 - a| >= d, one at |L| = 1
 * with margin p has 2 sin(p / 2) >= d.
 *
 * @param radiansPerUnit rad/s in one unit of the exception's frequencies
 */
export function hiddenMargin(margin: Pick<SmallestMargin, 'quantity' | 'direction'>, exception: CoverageException, radiansPerUnit: number): number {
  const distance = Math.max(0, exception.leastDistance ?? 0)
  const angle = distance < 2 ? 2 * Math.asin(distance / 2) : Infinity
  switch (margin.quantity) {
    case 'gainMargin':
      if (margin.direction === 'fall') return 20 * Math.log10(1 + distance)
      return distance < 1 ? -20 * Math.log10(1 - distance) : Infinity
    case 'phaseMargin': return angle * 180 / Math.PI
    case 'vectorMargin': return distance
    case 'delayMargin':
      return exception.to === 'infinity' || angle === 0 ? (angle === Infinity ? Infinity : 0) : angle / (exception.to * radiansPerUnit)
  }
}
