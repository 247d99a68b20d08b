import type { ComplexPair, LoopAnalysis, LoopInput, MeasuredQuantity } from './analysis'
import type { Versioned } from './system'

export interface CoefficientsDefinition {
  kind: 'coefficients'
  /** highest power first, in s, or in z with a sample time */
  numerator: number[]
  denominator: number[]
  deadTime?: number
  sampleTime?: number
}

export interface ZerosPolesDefinition {
  kind: 'zerosPoles'
  zeros: ComplexPair[]
  poles: ComplexPair[]
  gain: number
  deadTime?: number
  sampleTime?: number
}

/** The expression may name the system's parameters; their values come from the operating condition. */
export interface ExpressionDefinition {
  kind: 'expression'
  expression: string
  /** a factor exp(-s deadTime) of a continuous loop, beside what the expression says */
  deadTime?: number
  sampleTime?: number
}

/** How the columns of an uploaded file are read. Columns are counted from 0. */
export interface MeasurementMapping {
  frequencyColumn: number
  frequencyUnit: 'Hz' | 'rad/s'
  form: 'dB and degrees' | 'ratio and degrees' | 'dB and radians' | 'ratio and radians' | 'real and imaginary'
  firstColumn: number
  secondColumn: number
  coherenceColumn: number | null
  quantity: MeasuredQuantity
}

export interface MeasuredDefinition {
  kind: 'measured'
  uploadId: number
  mapping: MeasurementMapping
  averages?: number
  /** what the loop, closed, did during the test */
  stayedStable?: boolean
  openLoopUnstablePoles?: number
  openLoopOriginPoles?: number
  /** the amplitude it was measured at, as printed on paper */
  amplitude?: string
}

export type SourceDefinition = CoefficientsDefinition | ZerosPolesDefinition | ExpressionDefinition | MeasuredDefinition
export type SourceKind = SourceDefinition['kind']

export interface Source extends Versioned {
  loopId: number
  conditionId: number
  /** such as 'design model', 'correlated model', 'sweep 1' */
  name: string
  kind: SourceKind
  definition: SourceDefinition
  ofRecord: boolean
  /** why it is not of record */
  setAsideReason: string
}

/** A source with what the engine says of it, as GET /api/sources/[id] answers. */
export interface AnalysedSource {
  source: Source
  /** what was handed to the engine; the same input redraws the curve in the browser */
  input: LoopInput | null
  analysis: LoopAnalysis | null
  failure: { message: string, path: string } | null
}

export interface Upload {
  id: number
  fileName: string
  size: number
  sha256: string
}
