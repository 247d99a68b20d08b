import type { Criterion, CriterionQuantity, CriterionRow } from '#shared/types/criterion'
import { formatDecibels } from '#shared/formatting/formatDecibels'
import { formatDegrees } from '#shared/formatting/formatDegrees'
import { formatDelay } from '#shared/formatting/formatDelay'
import { formatDistance } from '#shared/formatting/formatDistance'
import { significantDigits } from '#shared/formatting/significantDigits'
import { withoutUnit } from './withoutUnit'

/** Each margin and its direction as the report's tables name them, in their order. */
export const marginKinds = [
  { quantity: 'gainMargin', direction: 'rise', name: 'gain may rise', unit: 'dB' },
  { quantity: 'gainMargin', direction: 'fall', name: 'gain may fall', unit: 'dB' },
  { quantity: 'phaseMargin', direction: 'lag', name: 'lag', unit: 'deg' },
  { quantity: 'phaseMargin', direction: 'lead', name: 'lead', unit: 'deg' },
  { quantity: 'delayMargin', direction: null, name: 'delay', unit: 'ms' },
  { quantity: 'vectorMargin', direction: null, name: 'vector margin', unit: '|1 + L|' },
] as const satisfies readonly { quantity: CriterionQuantity, direction: CriterionRow['direction'], name: string, unit: string }[]

export type MarginKind = (typeof marginKinds)[number]

export const quantityNames: Record<CriterionQuantity, string> = {
  gainMargin: 'gain margin',
  phaseMargin: 'phase margin',
  vectorMargin: 'vector margin',
  delayMargin: 'delay margin',
}

/** A margin's value with its unit, without its direction: '12.4 dB', '32.3 deg', '480 us', '0.435'. */
export function formatMargin(quantity: CriterionQuantity, value: number): string {
  switch (quantity) {
    case 'gainMargin': return formatDecibels(value)
    case 'phaseMargin': return formatDegrees(value)
    case 'delayMargin': return formatDelay(value)
    case 'vectorMargin': return formatDistance(value)
  }
}

/** The value as its column prints it, whose head carries the unit: delays in ms. */
export const marginFigure = (quantity: CriterionQuantity, value: number): string =>
  quantity === 'delayMargin' ? significantDigits(value * 1000, 3) : withoutUnit(formatMargin(quantity, value))

/** A limit in words: 'at least 6 dB', 'no limit'. */
export function limitWords(quantity: CriterionQuantity, limit: number | null): string {
  if (limit === null) return 'no limit'
  switch (quantity) {
    case 'gainMargin': return `at least ${Number(limit.toPrecision(6))} dB`
    case 'phaseMargin': return `at least ${Number(limit.toPrecision(6))} deg`
    case 'delayMargin': return `at least ${Number((limit * 1000).toPrecision(6))} ms`
    case 'vectorMargin': return `at least ${Number(limit.toPrecision(6))}`
  }
}

/** The limit on a quantity; null where there is none. */
export const limitOf = (criteria: readonly Criterion[], quantity: CriterionQuantity): number | null =>
  criteria.find(criterion => criterion.quantity === quantity)?.limit ?? null

/** All limits in one line: 'gain margin at least 6 dB, phase margin at least 30 deg, vector margin at least 0.5'. */
export function criteriaLine(criteria: readonly Criterion[]): string {
  const limited = criteria.filter(criterion => criterion.limit !== null)
  if (limited.length === 0) return 'no limits agreed'
  return limited.map(({ quantity, limit }) => `${quantityNames[quantity]} ${limitWords(quantity, limit)}`).join(', ')
}
