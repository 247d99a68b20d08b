import type { CriterionQuantity } from '#shared/types/criterion'

/** What each judged quantity is called on screen, with the unit its limit is typed in. */
export const quantityNames: Record<CriterionQuantity, { name: string, short: string, unit: string }> = {
  vectorMargin: { name: 'Vector margin', short: 'vector', unit: 'ratio' },
  gainMargin: { name: 'Gain margin', short: 'gain', unit: 'dB' },
  phaseMargin: { name: 'Phase margin', short: 'phase', unit: 'deg' },
  delayMargin: { name: 'Delay margin', short: 'delay', unit: 's' },
}
