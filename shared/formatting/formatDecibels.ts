import { significantDigits } from './significantDigits'
import { withoutMinusZero } from './withoutMinusZero'

/** The size of a gain margin without its direction: '12.4 dB'; 0.1 dB below 100 dB, three digits above. */
export function formatDecibels(decibels: number): string {
  const size = Math.abs(decibels)
  return `${size < 100 ? withoutMinusZero(size.toFixed(size < 1 ? 2 : 1)) : significantDigits(size, 3)} dB`
}
