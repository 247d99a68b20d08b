import type { ClosedLoopVerdict, ComplexPair, FrequencyUnit, LoopAnalysis, MarginSummary, VectorMargin } from './analysis'
import type { Judgement } from './criterion'

/** One pole of the closed loop (one of a conjugate pair is listed, the one above the real axis). */
export interface ClosedLoopPole {
  /** rad/s in the plane of s; of a sampled loop ln(z)/T */
  re: number
  im: number
  /** of a sampled loop, the pole itself */
  z?: ComplexPair
  /** |s| in the loop's frequency unit */
  frequency: number
  /** -Re s / |s| */
  damping: number
  /** s, -1 / Re s; null on the stability boundary, negative beyond it */
  timeConstant: number | null
  /** the open-loop pole it goes back to as the gain falls, in words with its block or mode; null where none is near */
  mode: string | null
}

export interface ClosedLoopPoles {
  frequencyUnit: FrequencyUnit
  poles: ClosedLoopPole[]
  /** why there is no list (dead time that is not whole samples, measured); null where there is */
  reason: string | null
}

/** Margins at one place of a table: the nominal ones, or with one thing changed. */
export interface MarginsThere {
  verdict: ClosedLoopVerdict
  summary: MarginSummary | null
  vectorMargin: VectorMargin | null
  /** why it could not be analysed */
  failure: string | null
}

export interface ModeShift extends MarginsThere {
  /** of the mode's frequency: -0.2, -0.1, 0.1, 0.2 */
  change: number
}

/** Each flexible mode moved with everything else, the notches above all, left where it is. */
export interface ModeShiftTable {
  frequencyUnit: FrequencyUnit
  nominal: MarginsThere
  modes: { block: string, mode: string, frequency: number, damping: number, shifts: ModeShift[] }[]
  /** why there is no table (no blocks, no flexible mode); null where there is */
  reason: string | null
  /** what was left out and why, and what a block was replaced by, in sentences */
  notes: string[]
}

export interface DifferenceBand {
  from: number
  to: number
  /** dB, other less reference, the largest in size */
  gain: { difference: number, frequency: number }
  /** deg, wrapped into (-180, 180] */
  phase: { difference: number, frequency: number }
  /** |L_other - L_reference| / |1 + L_reference|: 1 means the difference alone could reach -1 */
  relative: { ratio: number, frequency: number }
}

/** How far two sources of one loop in one condition lie apart. */
export interface SourceDifference {
  frequencyUnit: FrequencyUnit
  reference: string
  other: string
  bands: DifferenceBand[]
  /** at which frequencies they were compared, in a sentence; '' where they were not */
  basis: string
  /** why they were not compared; null where they were */
  reason: string | null
}

export interface EffectSide extends MarginsThere {
  judgement: Judgement
}

/** What a change of a block does to one loop in one condition. */
export interface BlockEffect {
  loopId: number
  conditionId: number
  before: EffectSide | null
  after: EffectSide | null
  /** whether any margin or the verdict differs */
  moved: boolean
}

/** What the engine can be asked of a loop in a thread of its own, and what it answers. */
export interface EngineAnswers {
  analysis: LoopAnalysis
  closedLoopPoles: ClosedLoopPoles
  modeShifts: ModeShiftTable
  sourceDifference: SourceDifference
}
export type EngineAnswer = EngineAnswers[keyof EngineAnswers]
