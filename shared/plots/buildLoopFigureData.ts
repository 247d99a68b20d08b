import type { LoopGain } from '../analysis/LoopGain'
import type { LoopAnalysis } from '../types/analysis'
import type { FigureCurve, LoopFigureData, MeasuredSample } from './FigureData'
import type { FrequencyRange } from './sampling/chooseFrequencyRange'
import { chooseFrequencyRange } from './sampling/chooseFrequencyRange'
import { sampleLoopGain } from './sampling/sampleLoopGain'

export interface CurveSource {
  /** What tells the curve from others in the same axes: the condition's name, the source's. */
  name: string
  analysis: LoopAnalysis
  gain: LoopGain
  /** Measured: the frequencies of the samples, in the analysis' unit. */
  sampleFrequencies?: ArrayLike<number>
  /** s; of a sampled loop */
  sampleTime?: number
  /** The continuous approximation of a sampled loop; its analysis is that of the loop gain it stands beside. */
  isApproximation?: boolean
}

export interface LoopFigureSource {
  /** as in 'SL-P Slew position' */
  title: string
  requiredVectorMargin: number | null
  /** The main curve first. All analyses are in one frequency unit. */
  curves: [CurveSource, ...CurveSource[]]
  /** @default chosen from the main curve by `chooseFrequencyRange` */
  range?: FrequencyRange
}

/** Everything the figures of one loop show, with each loop gain sampled over the range that all of them share. */
export function buildLoopFigureData(source: LoopFigureSource): LoopFigureData {
  const [first, ...others] = source.curves
  const range = source.range ?? chooseFrequencyRange(first.analysis, first.gain)
  return {
    title: source.title,
    frequencyUnit: first.analysis.frequencyUnit,
    range,
    requiredVectorMargin: source.requiredVectorMargin,
    curves: [buildCurve(first, range), ...others.map(other => buildCurve(other, range))],
  }
}

function buildCurve({ name, analysis, gain, sampleFrequencies, sampleTime, isApproximation = false }: CurveSource, range: FrequencyRange): FigureCurve {
  const unit = analysis.frequencyUnit === 'Hz' ? 2 * Math.PI : 1
  const measured = !isApproximation && (sampleFrequencies !== undefined || analysis.samples !== undefined)
  const untrusted = measured
    ? analysis.coverage.exceptions.map(({ from, to, reason }) => ({ from, to: to === 'infinity' ? range.to : to, reason }))
    : undefined
  const exact = [
    ...analysis.gainCrossovers.map(crossing => crossing.frequency),
    ...analysis.phaseCrossovers.map(crossing => crossing.frequency),
    ...analysis.closestApproaches.map(approach => approach.frequency),
    ...(untrusted ?? []).flatMap(({ from, to }) => [from, to]),
  ].filter((frequency): frequency is number => typeof frequency === 'number' && frequency > 0).map(frequency => frequency * unit)
  const seeds = Array.from(sampleFrequencies ?? [], frequency => frequency * unit)
  const { frequency, re, im, drawnTo } = sampleLoopGain(gain, { from: range.from * unit, to: range.to * unit, exact, seeds })
  const curve: FigureCurve = { name, analysis, curve: { frequency: frequency.map(w => w / unit), re, im, ...(drawnTo !== undefined && { drawnTo: drawnTo / unit }) } }
  if (isApproximation) curve.isApproximation = true
  if (measured) {
    curve.samples = measuredSamples(analysis, gain, sampleFrequencies, unit)
    curve.untrusted = untrusted
  }
  if (sampleTime !== undefined) curve.halfSampleRate = Math.PI / sampleTime / unit
  return curve
}

/** The samples with their confidence discs where the analysis has them, otherwise the bare points. */
function measuredSamples(analysis: LoopAnalysis, gain: LoopGain, frequencies: ArrayLike<number> | undefined, unit: number): MeasuredSample[] {
  const { discs } = analysis
  if (discs) return discs.map(({ frequency, re, im, radius }) => radius === null ? { frequency, re, im } : { frequency, re, im, radius })
  const out = new Float64Array(2)
  return Array.from(frequencies ?? []).flatMap(frequency => gain.evaluate(frequency * unit, out) ? [{ frequency, re: out[0]!, im: out[1]! }] : [])
}
