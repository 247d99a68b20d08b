import type { LoopAnalysis } from '../../types/analysis'
import type { Driver } from '../../types/criterion'
import type { SmallestMargin } from './SmallestMargin'

/**
 * The smallest margin of each kind and direction of a loop whose closed loop is stable, each with its driver: gain rising and
 * falling (dB), lag and lead (deg), vector margin (ratio), delay (s). All are sizes.
 * A margin of 0 counts in both directions: the locus passes through -1.
 */
export function smallestMargins(analysis: LoopAnalysis): SmallestMargin[] {
  const { gainCrossovers, phaseCrossovers } = analysis
  const gain = (sign: 1 | -1) => smallest(phaseCrossovers.map(crossing => sign * crossing.gainMargin), 'phaseCrossover', phaseCrossovers)
  const phase = (sign: 1 | -1) => smallest(gainCrossovers.map(crossing => sign * crossing.phaseMargin), 'gainCrossover', gainCrossovers)
  return [
    { quantity: 'gainMargin', direction: 'rise', ...gain(1) },
    { quantity: 'gainMargin', direction: 'fall', ...gain(-1) },
    { quantity: 'phaseMargin', direction: 'lag', ...phase(1) },
    { quantity: 'phaseMargin', direction: 'lead', ...phase(-1) },
    { quantity: 'vectorMargin', direction: null, ...vectorMargin(analysis) },
    { quantity: 'delayMargin', direction: null, ...delayMargin(analysis) },
  ]
}

type Found = Pick<SmallestMargin, 'value' | 'driver'>

function smallest(values: number[], kind: Driver['kind'], crossings: { frequency: Driver['frequency'] }[]): Found {
  let index = -1
  values.forEach((value, at) => {
    if (value >= 0 && (index < 0 || value < values[index]!)) index = at
  })
  if (index < 0) return { value: null, driver: null }
  // Math.abs: a size of -0 would be printed with its sign.
  return { value: Math.abs(values[index]!), driver: { kind, index, frequency: crossings[index]!.frequency } }
}

function vectorMargin({ vectorMargin, closestApproaches }: LoopAnalysis): Found {
  if (vectorMargin === null) return { value: null, driver: null }
  const index = closestApproaches.findIndex(approach => approach.frequency === vectorMargin.frequency)
  const driver: Driver = index < 0
    ? { kind: 'end', index: null, frequency: vectorMargin.frequency }
    : { kind: 'closestApproach', index, frequency: vectorMargin.frequency }
  return { value: vectorMargin.distance, driver }
}

/** The list's smallest delay, unless the summary knows a smaller one at the end of the axis (a biproper loop with |L| > 1 there: 0 s). */
function delayMargin({ gainCrossovers, summary }: LoopAnalysis): Found {
  const listed = smallest(gainCrossovers.map(crossing => crossing.delayMargin), 'gainCrossover', gainCrossovers)
  const delay = summary?.delay ?? null
  if (delay !== null && delay === 0 && listed.value !== 0) return { value: 0, driver: { kind: 'end', index: null, frequency: 'infinity' } }
  return listed
}
