import { formatDegrees } from './formatDegrees'

/** The phase part of a simultaneous change: 'lag 14.0 deg' for a negative one, 'lead 3.20 deg', 'phase as it is'. */
export function formatPhaseChange(degrees: number): string {
  if (Math.abs(degrees) < 0.005) return 'phase as it is'
  return `${degrees < 0 ? 'lag' : 'lead'} ${formatDegrees(degrees)}`
}
