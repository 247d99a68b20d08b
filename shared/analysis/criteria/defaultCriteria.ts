import type { Criterion } from '../../types/criterion'

/**
 * What a new system starts from: 6 dB in both directions, 30 deg of lag and of lead, a vector margin of 0.5, no limit on delay.
 * Common practice, no source.
 */
export const defaultCriteria: readonly Criterion[] = [
  { quantity: 'gainMargin', limit: 6 },
  { quantity: 'phaseMargin', limit: 30 },
  { quantity: 'vectorMargin', limit: 0.5 },
  { quantity: 'delayMargin', limit: null },
]
