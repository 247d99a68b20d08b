import type { LoopAnalysis, LoopInput } from '../../types/analysis'
import type { DifferenceBand, SourceDifference } from '../../types/structure'
import { AnalysisInputError } from '../AnalysisInputError'
import type { LoopGain } from '../LoopGain'
import { wrapDegrees } from '../margins/wrapDegrees'
import { prepareLoopGain } from '../prepareLoopGain'
import { chooseComparedFrequencies, type PreparedSource } from './chooseComparedFrequencies'

export interface ComparedSource {
  name: string
  /** null where the source gives no loop gain */
  input: LoopInput | null
  analysis: LoopAnalysis | null
}

const TWO_PI = 2 * Math.PI
const DEGREES = 180 / Math.PI
const DEFAULT_FLOOR = -60

/**
 * How far another source of a loop lies from the reference, decade by decade of frequency: the largest difference of gain in dB and of phase in
 * degrees (other less reference), and the largest |L_other - L_reference| / |1 + L_reference|, of which 1 could reach -1. Compared at the points of a
 * measured response, of the coarser where both are measured (the other by interpolation of log gain and unwrapped phase), and on a dense
 * grid with all crossings between two models; points where both lie below the gain floor are left out. Frequencies in the reference's unit.
 */
export function compareSources(reference: ComparedSource, other: ComparedSource): SourceDifference {
  const frequencyUnit = reference.input?.frequencyUnit ?? 'rad/s'
  const head = { frequencyUnit, reference: reference.name, other: other.name }
  const without = (reason: string): SourceDifference => ({ ...head, bands: [], basis: '', reason })
  const sides: PreparedSource[] = []
  for (const { name, input, analysis } of [reference, other]) {
    if (input === null) return without(`'${name}' gives no loop gain to compare.`)
    try {
      sides.push({ name, input, analysis, gain: prepareLoopGain(input) })
    }
    catch (error) {
      if (error instanceof AnalysisInputError) return without(`'${name}' gives no loop gain to compare: ${error.message}`)
      throw error
    }
  }
  const [first, second] = sides as [PreparedSource, PreparedSource]
  const chosen = chooseComparedFrequencies(first, second)
  if ('reason' in chosen) return without(chosen.reason)
  const floor = 10 ** (Math.min(...sides.map(({ input }) => input.gainFloor ?? DEFAULT_FLOOR)) / 20)
  const points = chosen.frequencies.flatMap(w => differenceAt(first.gain, second.gain, w, floor))
  if (points.length === 0) return without('At no common frequency do both have a loop gain above the gain floor.')
  return { ...head, bands: bandsOf(points, frequencyUnit === 'Hz' ? TWO_PI : 1), basis: chosen.basis, reason: null }
}

interface Difference { w: number, gain: number, phase: number, ratio: number }

function differenceAt(reference: LoopGain, other: LoopGain, w: number, floor: number): Difference[] {
  const [a, b] = [new Float64Array(2), new Float64Array(2)]
  if (!reference.evaluate(w, a) || !other.evaluate(w, b)) return []
  const [ar, ai, br, bi] = [a[0]!, a[1]!, b[0]!, b[1]!]
  const [size, otherSize] = [Math.hypot(ar, ai), Math.hypot(br, bi)]
  if (size === 0 || otherSize === 0 || Math.max(size, otherSize) < floor) return []
  return [{
    w,
    gain: 20 * Math.log10(otherSize / size),
    phase: wrapDegrees((Math.atan2(bi, br) - Math.atan2(ai, ar)) * DEGREES),
    // On -1 itself the ratio has no bound; a number can still be stored.
    ratio: Math.min(Number.MAX_VALUE, Math.hypot(br - ar, bi - ai) / Math.hypot(1 + ar, ai)),
  }]
}

function bandsOf(points: Difference[], unit: number): DifferenceBand[] {
  const [first, last] = [points[0]!.w / unit, points[points.length - 1]!.w / unit]
  const decades = new Map<number, Difference[]>()
  for (const point of points) {
    const frequency = point.w / unit
    const decade = decadeOf(frequency)
    // A point on the last edge closes the decade below it rather than opening one of its own.
    const own = frequency === last && frequency === 10 ** decade && decades.has(decade - 1) ? decade - 1 : decade
    decades.set(own, [...decades.get(own) ?? [], point])
  }
  return [...decades].map(([decade, within]) => {
    const largest = (of: (point: Difference) => number) => within.reduce((most, point) => Math.abs(of(point)) > Math.abs(of(most)) ? point : most)
    const [gain, phase, relative] = [largest(p => p.gain), largest(p => p.phase), largest(p => p.ratio)]
    return {
      from: Math.max(first, 10 ** decade),
      to: Math.min(last, 10 ** (decade + 1)),
      gain: { difference: gain.gain, frequency: gain.w / unit },
      phase: { difference: phase.phase, frequency: phase.w / unit },
      relative: { ratio: relative.ratio, frequency: relative.w / unit },
    }
  })
}

/** k with 10^k <= frequency < 10^(k+1), exactly at the edges. */
function decadeOf(frequency: number): number {
  const decade = Math.floor(Math.log10(frequency))
  return frequency >= 10 ** (decade + 1) ? decade + 1 : frequency < 10 ** decade ? decade - 1 : decade
}
