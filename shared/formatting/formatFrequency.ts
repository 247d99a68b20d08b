import type { FrequencyUnit, ListedFrequency } from '../types/analysis'
import { significantDigits } from './significantDigits'

/**
 * A listed frequency with its unit: '12.30 rad/s', '0 Hz', 'infinity' for the end of the axis.
 * Without a unit only the number, for columns that carry the unit in their head.
 */
export function formatFrequency(frequency: ListedFrequency, unit?: FrequencyUnit): string {
  if (frequency === 'infinity' || frequency === Number.POSITIVE_INFINITY) return 'infinity'
  const figure = significantDigits(frequency)
  return unit === undefined ? figure : `${figure} ${unit}`
}
