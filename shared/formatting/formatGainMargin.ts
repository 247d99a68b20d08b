import { formatDecibels } from './formatDecibels'

/**
 * A gain margin in words: 'gain may rise 12.4 dB' for a positive one, 'gain may fall 6.1 dB' for a negative one.
 * A margin of exactly 0 dB is the critical point itself: 'no gain margin'.
 */
export function formatGainMargin(decibels: number): string {
  if (decibels === 0) return 'no gain margin'
  return `gain may ${decibels > 0 ? 'rise' : 'fall'} ${formatDecibels(decibels)}`
}
