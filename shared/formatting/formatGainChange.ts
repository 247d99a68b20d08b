import { formatDecibels } from './formatDecibels'

/** The gain part of a simultaneous change: 'gain rises 3.2 dB', 'gain falls 0.40 dB', 'gain as it is'. */
export function formatGainChange(decibels: number): string {
  if (Math.abs(decibels) < 0.005) return 'gain as it is'
  return `gain ${decibels > 0 ? 'rises' : 'falls'} ${formatDecibels(decibels)}`
}
