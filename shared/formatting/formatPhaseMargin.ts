import { formatDegrees } from './formatDegrees'

/**
 * A phase margin in words: 'lag 32.3 deg' where that much lag reaches the critical point (positive), 'lead 20.0 deg' where that
 * much lead does (negative), 'no phase margin' at the critical point itself.
 */
export function formatPhaseMargin(degrees: number): string {
  if (degrees === 0) return 'no phase margin'
  return `${degrees > 0 ? 'lag' : 'lead'} ${formatDegrees(degrees)}`
}
