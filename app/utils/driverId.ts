import type { Driver } from '#shared/types/criterion'

const kinds = { gainCrossover: 'gain', phaseCrossover: 'phase', closestApproach: 'approach' } as const

/** The id, in figures and tables, of the crossing that sets a margin; null for an end of the axis, which is no listed crossing. */
export const driverId = (driver: Driver): string | null =>
  driver.kind === 'end' || driver.index === null ? null : `${kinds[driver.kind]}-${driver.index}`
