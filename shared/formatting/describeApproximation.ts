import type { ApproximationDifference } from '../types/analysis'
import { formatDecibels } from './formatDecibels'
import { formatDegrees } from './formatDegrees'

/**
 * What the continuous approximation says at a frequency beside the exact discrete equivalent:
 * 'approximation: lag 3.40 deg more, 0.20 dB less'.
 */
export function describeApproximation({ gain, phase }: ApproximationDifference): string {
  const parts = [
    ...(Math.abs(phase) < 0.005 ? [] : [`lag ${formatDegrees(phase)} ${phase < 0 ? 'more' : 'less'}`]),
    ...(Math.abs(gain) < 0.005 ? [] : [`${formatDecibels(gain)} ${gain > 0 ? 'more' : 'less'}`]),
  ]
  return `approximation: ${parts.length === 0 ? 'the same' : parts.join(', ')}`
}
