import type { GainCrossover } from '../../types/analysis'

/** A stretch of frequency where |L| > 1; null where it reaches the end of what is shown. */
export interface StretchAboveOne {
  from: number | null
  to: number | null
}

/**
 * Where the gain is above one, from the gain crossovers in order of frequency: from a rising one to the next falling one.
 * `aboveAtStart` tells it where there is no crossover.
 */
export function stretchesAboveOne(crossovers: readonly GainCrossover[], aboveAtStart: boolean): StretchAboveOne[] {
  if (crossovers.length === 0) return aboveAtStart ? [{ from: null, to: null }] : []
  const stretches: StretchAboveOne[] = []
  let open: number | null | undefined = crossovers[0]!.slope === 'falling' ? null : undefined
  for (const { frequency, slope } of crossovers) {
    if (slope === 'rising') open = frequency
    else if (open !== undefined) {
      stretches.push({ from: open, to: frequency })
      open = undefined
    }
  }
  if (open !== undefined) stretches.push({ from: open, to: null })
  return stretches
}
