import { significantDigits } from './significantDigits'

/** The size of an angle without its direction: '32.3 deg', '4.25 deg', '120 deg'. */
export function formatDegrees(degrees: number): string {
  return `${significantDigits(Math.abs(degrees), 3)} deg`
}
