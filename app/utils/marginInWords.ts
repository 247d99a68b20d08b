import { formatDecibels } from '#shared/formatting/formatDecibels'
import { formatDegrees } from '#shared/formatting/formatDegrees'
import { formatDelay } from '#shared/formatting/formatDelay'
import { formatDistance } from '#shared/formatting/formatDistance'
import type { CriterionRow } from '#shared/types/criterion'

/** A smallest margin with its direction as a word: '0.435', 'rise 12.4 dB', 'lag 27.1 deg', '5.90 ms'; 'no crossing' where none limits it. */
export function marginInWords({ quantity, direction, value }: Pick<CriterionRow, 'quantity' | 'direction' | 'value'>): string {
  if (value === null) return 'no crossing'
  if (quantity === 'vectorMargin') return formatDistance(value)
  if (quantity === 'delayMargin') return formatDelay(value)
  const size = quantity === 'gainMargin' ? formatDecibels(value) : formatDegrees(value)
  return direction === null ? size : `${direction} ${size}`
}
