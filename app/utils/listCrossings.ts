import type { ApproximationDifference, CrossingSlope, ListedFrequency, LoopAnalysis } from '#shared/types/analysis'

/** One line of the table of every crossing. `id` is that of its mark in the figures: kind and place in the analysis' list. */
export interface ListedCrossing {
  id: string
  kind: 'gain' | 'phase' | 'approach'
  frequency: ListedFrequency
  slope: CrossingSlope | null
  /** deg, as signed in the analysis */
  phaseMargin: number | null
  /** dB, as signed in the analysis */
  gainMargin: number | null
  /** s */
  delayMargin: number | null
  /** the simultaneous change that reaches -1 there: dB, deg */
  change: { gain: number, phase: number } | null
  /** |1 + L| */
  distance: number
  /** measured: no more than the noise of its samples would make */
  withinNoise: boolean
  /** what the continuous approximation of a sampled loop says there beside the exact discrete equivalent */
  approximation: ApproximationDifference | null
}

const place = (frequency: ListedFrequency) => frequency === 'infinity' ? Number.POSITIVE_INFINITY : frequency

/**
 * Every gain crossover, phase crossover and closest approach of a loop, mixed, in order of frequency.
 * |1 + L| of a crossing follows in closed form from its margin where the analysis does not carry it:
 * 2 sin(|phase margin| / 2) at |L| = 1, and |1 - 10^(-gain margin / 20)| where L is real and negative.
 */
export function listCrossings(analysis: LoopAnalysis): ListedCrossing[] {
  const none = { slope: null, phaseMargin: null, gainMargin: null, delayMargin: null, change: null, withinNoise: false, approximation: null }
  const rows: ListedCrossing[] = [
    ...analysis.gainCrossovers.map(({ frequency, slope, phaseMargin, delayMargin, distance, approximation = null }, index): ListedCrossing => ({
      ...none, id: `gain-${index}`, kind: 'gain', frequency, slope, phaseMargin, delayMargin, approximation,
      distance: distance ?? 2 * Math.sin(Math.abs(phaseMargin) * Math.PI / 360),
    })),
    ...analysis.phaseCrossovers.map(({ frequency, slope, gainMargin, distance, withinNoise, approximation = null }, index): ListedCrossing => ({
      ...none, id: `phase-${index}`, kind: 'phase', frequency, slope, gainMargin, withinNoise: withinNoise ?? false, approximation,
      distance: distance ?? Math.abs(1 - 10 ** (-gainMargin / 20)),
    })),
    ...analysis.closestApproaches.map(({ frequency, distance, gainChange, phaseChange, withinNoise, approximation = null }, index): ListedCrossing => ({
      ...none, id: `approach-${index}`, kind: 'approach', frequency, distance, withinNoise: withinNoise ?? false, approximation, change: { gain: gainChange, phase: phaseChange },
    })),
  ]
  return rows.sort((a, b) => {
    const [first, second] = [place(a.frequency), place(b.frequency)]
    return first === second ? 0 : first - second
  })
}
