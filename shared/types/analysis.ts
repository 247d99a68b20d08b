/**
 * The contract of one loop's analysis: what goes in and what comes out, on every floor.
 *
 * Conventions: L is the loop gain for negative feedback, the critical point is -1, the return difference is 1 + L.
 * Frequencies stand in `frequencyUnit`, in and out; s, zeros and poles are always in rad/s.
 * Gains in dB, phases in degrees, times in seconds. Lists are in order of frequency and hold every entry.
 */

import type { BlockGain } from './block'

export type FrequencyUnit = 'rad/s' | 'Hz'

/** A frequency in a list: a number in the input's unit, or the end of the axis of a continuous biproper loop. */
export type ListedFrequency = number | 'infinity'

/** [real part, imaginary part] */
export type ComplexPair = [number, number]

export interface CommonInput {
  name?: string
  /** @default 'rad/s' */
  frequencyUnit?: FrequencyUnit
  /** dB; crossings where |L| is below this are left out. @default -60 */
  gainFloor?: number
  /** Band of the lists and of the vector margin. @default all frequencies, 0 and infinity (or pi/T) included */
  band?: [number, number]
}

/** L(s) or, with a sample time, L(z), as coefficients with the highest power first. */
export interface CoefficientsInput extends CommonInput {
  numerator: number[]
  denominator: number[]
  /** s; a factor exp(-s deadTime) */
  deadTime?: number
  /** s; the coefficients are in z when this is given */
  sampleTime?: number
}

/** gain * prod(s - zero) / prod(s - pole), or the same in z. Complex roots come in conjugate pairs. */
export interface ZerosPolesInput extends CommonInput {
  zeros: ComplexPair[]
  poles: ComplexPair[]
  gain: number
  deadTime?: number
  sampleTime?: number
}

/**
 * A typed expression in s, or in z with a sample time, with named parameters and blocks. With a sampled block or a hold among its blocks the
 * loop is sampled at theirs: continuous blocks behind a hold are taken by their exact discrete equivalent.
 */
export interface ExpressionInput extends CommonInput {
  expression: string
  parameters?: Record<string, number>
  sampleTime?: number
  /** by name; one with several channels is written G[output, input], by number from 1 or by name */
  blocks?: Record<string, BlockGain>
}

export type MeasuredQuantity = 'loopGain' | 'returnDifference' | 'sensitivity' | 'complementarySensitivity'

export interface MeasuredPoint {
  frequency: number
  re: number
  im: number
  /** Ordinary coherence of the estimate, 0 to 1. */
  coherence?: number
}

export interface MeasuredInput extends CommonInput {
  measured: {
    quantity: MeasuredQuantity
    points: MeasuredPoint[]
    /** Number of averages behind each point. */
    averages?: number
    /** What the loop, closed, did during the test. */
    stayedStable?: boolean
  }
  /** Poles of L beyond the stability boundary (right half plane, or outside the unit circle). */
  openLoopUnstablePoles?: number
  /** Poles of L at s = 0 (or z = 1). */
  openLoopOriginPoles?: number
}

export type LoopInput = CoefficientsInput | ZerosPolesInput | ExpressionInput | MeasuredInput

export type CrossingSlope = 'falling' | 'rising'

/** A sampled controller on a continuous plant: what the continuous approximation C(e^jwT) hold delay G(jw) says at a frequency, less what the exact discrete equivalent says. */
export interface ApproximationDifference {
  /** dB */
  gain: number
  /** deg, wrapped into (-180, 180] */
  phase: number
  /** of |1 + L| */
  distance: number
}

/** What a reader must know of how the loop gain was built. */
export interface StructureNote {
  /** the block it is about; '' for the loop */
  block: string
  /** stable name, for tests and screens */
  code: 'unreachable' | 'unobservable' | 'hidden unstable' | 'hidden boundary' | 'averaged hold' | 'coherence dropped' | 'other'
  message: string
}

/** How the loop gain was built from blocks. */
export interface LoopStructure {
  /** s, of a sampled loop */
  sampleTime?: number
  /** relative size by which the factors analysed may differ from the loop gain as given, on the axis, where matrices or discrete equivalents stand in it */
  accuracy?: { relative: number, basis: string }
  /** whether a continuous approximation was compared at each crossing */
  approximated: boolean
  notes: StructureNote[]
}

export interface GainCrossover {
  frequency: number
  /** deg, 180 + arg L wrapped into (-180, 180]; positive: that much lag reaches -1; negative: that much lead does */
  phaseMargin: number
  /** s, the smallest added delay that reaches -1: (phaseMargin mod 360) / w */
  delayMargin: number
  slope: CrossingSlope
  /** |1 + L| at this frequency */
  distance?: number
  approximation?: ApproximationDifference
}

export interface PhaseCrossover {
  frequency: ListedFrequency
  /** dB, -20 log10 |L|; positive: the gain may rise by it; negative: it may fall by it */
  gainMargin: number
  /** slope of the phase */
  slope: CrossingSlope
  /** |1 + L| at this frequency */
  distance?: number
  /** measured: the 95 % confidence circle of a sample beside it holds L = 0, so its phase is noise */
  withinNoise?: boolean
  approximation?: ApproximationDifference
}

export interface ClosestApproach {
  frequency: number
  /** |1 + L|, a local minimum inside the band */
  distance: number
  /** dB, and deg (lag negative): the simultaneous change that takes that point of L to -1 */
  gainChange: number
  phaseChange: number
  /** measured: the dip is no deeper than the 95 % confidence circle of its sample is wide, so it may be noise */
  withinNoise?: boolean
  approximation?: ApproximationDifference
}

export interface VectorMargin {
  /** greatest lower bound of |1 + L| over the band, ends included */
  distance: number
  frequency: ListedFrequency
}

/** The smallest margin of each kind over all crossings; null where there is none. */
export interface MarginSummary {
  gainIncrease: number | null
  gainDecrease: number | null
  phaseLag: number | null
  phaseLead: number | null
  delay: number | null
  impliedGainIncrease: number | null
  impliedGainDecrease: number
  impliedPhase: number
  /** max |S| and max |T|, ratios */
  sensitivityPeak: number
  complementarySensitivityPeak: number
}

/** Symmetric disk margin, Seiler, Packard, Gahinet, IEEE Control Systems Magazine 40 (2020). */
export interface DiskMargin {
  /** 1 / max |S - 1/2| */
  alpha: number
  frequency: ListedFrequency
  /** dB */
  gainIncrease: number | null
  gainDecrease: number | null
  /** deg */
  phase: number
}

export type ClosedLoopVerdict = 'stable' | 'unstable' | 'marginal' | 'undetermined'

export interface Stability {
  verdict: ClosedLoopVerdict
  basis: 'counted' | 'observed' | 'observed and counted'
  openLoopUnstablePoles: number | null
  /** counter-clockwise encirclements of -1 */
  encirclements: number | null
  closedLoopUnstablePoles: number | null
  /** Why the verdict is not plain, or what a reader must know of it (a hidden cancellation, say). */
  reason?: string
}

export interface CoverageException {
  from: number
  to: ListedFrequency
  reason: string
  /** Stable name of the reason, for tests and screens. */
  code?: string
  /** What |1 + L| is at least in the stretch, where that much can be said: what hides there has margins no smaller than it implies. */
  leastDistance?: number
}

/** The 95 % confidence circle of a measured sample, as a disc about the loop gain. */
export interface ConfidenceDisc {
  frequency: number
  /** the loop gain L of the sample */
  re: number
  im: number
  /** radius in the plane of L; null where the data bound nothing */
  radius: number | null
}

export interface Coverage {
  proven: boolean
  from: number
  to: ListedFrequency
  exceptions: CoverageException[]
}

export interface LoopAnalysis {
  name?: string
  frequencyUnit: FrequencyUnit
  gainCrossovers: GainCrossover[]
  phaseCrossovers: PhaseCrossover[]
  closestApproaches: ClosestApproach[]
  vectorMargin: VectorMargin | null
  /** null unless the verdict is 'stable': a loop that is not stable has no margins */
  summary: MarginSummary | null
  /** null unless the verdict is 'stable' */
  diskMargin?: DiskMargin | null
  stability: Stability
  coverage: Coverage
  /** Measured: how many samples lie in the band. */
  samples?: number
  /** Measured with coherence and averages: one for each sample in the band. */
  discs?: ConfidenceDisc[]
  /** Present where the loop gain was built from blocks. */
  structure?: LoopStructure
}

/** In the place of an analysis that could not be made. */
export interface AnalysisFailure {
  error: { message: string, path: string }
}
