import type { LoopAnalysis, LoopInput } from '../../types/analysis'
import type { LoopGain } from '../LoopGain'
import { samplesOfInput } from './samplesOfInput'

export interface PreparedSource {
  name: string
  input: LoopInput
  analysis: LoopAnalysis | null
  gain: LoopGain
}

const TWO_PI = 2 * Math.PI
const POINTS_A_DECADE = 250
/** Beside a feature, in its half-widths: where the flanks of a resonance lie. */
const FLANKS = [-3, -1, -0.5, 0, 0.5, 1, 3]

/**
 * At which frequencies (rad/s, rising) two sources are compared, with a sentence that says so; or the reason why at none.
 */
export function chooseComparedFrequencies(first: PreparedSource, second: PreparedSource): { frequencies: number[], basis: string } | { reason: string } {
  const [from, to] = commonRange(first, second)
  if (!(from <= to)) return { reason: `'${first.name}' and '${second.name}' have no frequency in common.` }
  const inside = (frequencies: number[]) => [...new Set(frequencies)].filter(w => w > 0 && w >= from && w <= to).sort((a, b) => a - b)
  const samples = [first, second].map(({ input }) => samplesOfInput(input)).map(list => list && inside(list))
  const [ofFirst, ofSecond] = samples as [number[] | null, number[] | null]
  if (ofFirst === null && ofSecond === null) {
    const frequencies = inside(modelGrid(first, second, from, to))
    return frequencies.length === 0
      ? { reason: 'Neither has a crossing or a break frequency to compare about.' }
      : { frequencies, basis: `Compared at ${frequencies.length} frequencies, all crossings of both among them.` }
  }
  if (ofFirst !== null && ofSecond !== null) {
    const [coarser, finer, frequencies] = ofFirst.length <= ofSecond.length ? [first, second, ofFirst] : [second, first, ofSecond]
    return among(frequencies, coarser, `, '${finer.name}' between its own points by interpolation of log gain and unwrapped phase`)
  }
  return ofFirst !== null ? among(ofFirst, first, '') : among(ofSecond!, second, '')
}

function among(frequencies: number[], { name }: PreparedSource, more: string): { frequencies: number[], basis: string } | { reason: string } {
  return frequencies.length === 0
    ? { reason: `No point of '${name}' lies where the other has a loop gain.` }
    : { frequencies, basis: `Compared at ${frequencies.length} points of '${name}'${more}.` }
}

/** rad/s: both axes, and both bands where they are given. */
function commonRange(...sources: PreparedSource[]): [number, number] {
  const bands = sources.map(({ input, gain }): [number, number] => {
    const unit = input.frequencyUnit === 'Hz' ? TWO_PI : 1
    return [Math.max(gain.axisStart, (input.band?.[0] ?? 0) * unit), Math.min(gain.axisEnd, (input.band?.[1] ?? Infinity) * unit)]
  })
  return [Math.max(...bands.map(([from]) => from)), Math.min(...bands.map(([, to]) => to))]
}

/** From a decade below the first crossing of either to a decade above the last, or about the break frequencies where nothing crosses. */
function modelGrid(first: PreparedSource, second: PreparedSource, from: number, to: number): number[] {
  const crossings = [first, second].flatMap(crossingsOf)
  const features = [first, second].flatMap(({ gain }) => gain.features).filter(({ frequency }) => frequency > 0 && Number.isFinite(frequency))
  const middle = crossings.length > 0 ? crossings : features.map(({ frequency }) => frequency)
  if (middle.length === 0) return []
  const [low, high] = [Math.max(from, Math.min(...middle) / 10), Math.min(to, Math.max(...middle) * 10)]
  const steps = Math.max(1, Math.ceil(Math.log10(high / low) * POINTS_A_DECADE))
  const grid = Array.from({ length: steps + 1 }, (_, k) => k === 0 ? low : k === steps ? high : low * (high / low) ** (k / steps))
  const flanks = features.flatMap(({ frequency, width }) => FLANKS.map(flank => frequency + flank * width))
  // The edges of the decades, in the unit they are told in.
  const unit = first.input.frequencyUnit === 'Hz' ? TWO_PI : 1
  const decades = Array.from({ length: Math.ceil(Math.log10(high / low)) + 2 }, (_, k) => 10 ** (Math.floor(Math.log10(low / unit)) + k) * unit)
  return [...grid, ...crossings, ...flanks, ...decades].filter(w => w >= low && w <= high)
}

function crossingsOf({ input, analysis }: PreparedSource): number[] {
  if (analysis === null) return []
  const unit = input.frequencyUnit === 'Hz' ? TWO_PI : 1
  return [...analysis.gainCrossovers, ...analysis.phaseCrossovers, ...analysis.closestApproaches]
    .flatMap(({ frequency }) => typeof frequency === 'number' && frequency > 0 ? [frequency * unit] : [])
}
