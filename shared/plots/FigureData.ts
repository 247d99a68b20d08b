import type { FrequencyUnit, LoopAnalysis } from '../types/analysis'

/**
 * Samples of a loop gain in order of frequency, drawn as a line from each to the next.
 * A sample whose parts are NaN breaks the line: there the loop gain has no value.
 */
export interface SampledCurve {
  /** in the unit of whatever holds the curve */
  frequency: Float64Array
  re: Float64Array
  im: Float64Array
  /** the line ends here, short of the range asked for: beyond it the loop gain turns too often to be drawn; in the unit of `frequency` */
  drawnTo?: number
}

/** A measured point of L with the radius of its confidence disc, where coherence and averages were given. */
export interface MeasuredSample {
  frequency: number
  re: number
  im: number
  radius?: number
}

/** A stretch of frequency in which a measured response cannot be trusted between its samples. */
export interface UntrustedGap {
  from: number
  to: number
  reason: string
}

/** One loop gain in a figure: one loop in one condition from one source. */
export interface FigureCurve {
  /** What tells it from the others in the same axes, as in 'Extended, sea state 5' or 'sweep 2'. */
  name: string
  curve: SampledCurve
  analysis: LoopAnalysis
  /** Present where L was measured. */
  samples?: MeasuredSample[]
  untrusted?: UntrustedGap[]
  /** in the figure's unit; pi/T of a sampled loop */
  halfSampleRate?: number
  /** The continuous approximation of a sampled loop, drawn thin; its analysis is that of the loop gain it stands beside. */
  isApproximation?: boolean
}

/** What the figures of one loop show. The first curve is the main one: it carries the marks and the labels. */
export interface LoopFigureData {
  /** as in 'SL-P Slew position' */
  title: string
  frequencyUnit: FrequencyUnit
  range: { from: number, to: number }
  /** null where no criterion asks for a vector margin */
  requiredVectorMargin: number | null
  curves: [FigureCurve, ...FigureCurve[]]
}

/** How a row of the crossing chart is coloured; its words say the same. */
export type RowStanding = 'met' | 'not met' | 'accepted' | 'not shown' | 'unstable' | 'no data' | 'not applicable'

export interface CrossingChartRow {
  /** Unique among the rows; stands before the ids of the row's marks. */
  key: string
  code: string
  name: string
  /** in words, as in 'stable, not met' */
  verdict: string
  standing: RowStanding
  requiredVectorMargin: number | null
  /** null where there is no data, or no analysis could be made */
  analysis: LoopAnalysis | null
  /** Whether |L| > 1 at the lower end of the range; told by the crossovers themselves where there are any. */
  gainAboveOne: boolean
  /** Band of the loop gain in the chart's unit: the data's of a measured loop, up to pi/T of a sampled one. */
  band?: { from: number, to: number }
}

export interface CrossingChartData {
  /** as in 'Extended, sea state 5' */
  condition: string
  frequencyUnit: FrequencyUnit
  range: { from: number, to: number }
  rows: CrossingChartRow[]
}

/** The frequency response of one block between an input and an output. */
export interface BlockResponseData {
  /** as in 'G[rate, torque]' */
  title: string
  frequencyUnit: FrequencyUnit
  range: { from: number, to: number }
  response: SampledCurve
  /** present where it was measured */
  samples?: MeasuredSample[]
  /** in the figure's unit; pi/T of a sampled block */
  halfSampleRate?: number
}
