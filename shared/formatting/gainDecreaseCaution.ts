import type { MarginSummary } from '../types/analysis'
import { formatDecibels } from './formatDecibels'

/**
 * The caution that belongs beside every finite margin against falling gain: 'gain falls in saturation or at start-up: 6.1 dB left'.
 * Null where no fall of the gain reaches -1, and without margins.
 */
export function gainDecreaseCaution(summary: Pick<MarginSummary, 'gainDecrease'> | null): string | null {
  const decrease = summary?.gainDecrease ?? null
  return decrease === null ? null : `gain falls in saturation or at start-up: ${formatDecibels(decrease)} left`
}
