import type { FrequencyUnit, MeasuredPoint, ComplexPair } from './analysis'
import type { MeasurementMapping } from './source'
import type { Versioned } from './system'

/** What a block is in the system; modes of plants, actuators and sensors are flexible modes, those of filters are notches. */
export type BlockRole = 'controller' | 'filter' | 'actuator' | 'plant' | 'sensor' | 'delay' | 'hold' | 'other'

/** A lightly damped mode: gainOut * gainIn * s^derivative / (s^2 + 2 damping w s + w^2) with w its frequency in rad/s. */
export interface ModalMode {
  name: string
  /** undamped natural frequency in the table's unit */
  frequency: number
  /** ratio to critical */
  damping: number
  /** one for each input of the block */
  gainIn: number[]
  /** one for each output of the block */
  gainOut: number[]
}

/** A rigid body or residual term: gainOut * gainIn * s^power, whatever the table's derivative. */
export interface RigidTerm {
  power: 0 | -1 | -2
  gainIn: number[]
  gainOut: number[]
}

/** A typed gain in s, or in z with a sample time; it may name parameters and other blocks. */
export interface ExpressionGain { kind: 'expression', expression: string, sampleTime?: number }
/** Highest power first. */
export interface CoefficientsGain { kind: 'coefficients', numerator: number[], denominator: number[], deadTime?: number, sampleTime?: number }
export interface ZerosPolesGain { kind: 'zerosPoles', zeros: ComplexPair[], poles: ComplexPair[], gain: number, deadTime?: number, sampleTime?: number }

/** x' = A x + B u, y = C x + D u, or x[k+1] with a sample time. Rows of numbers; A n by n, B n by inputs, C outputs by n, D outputs by inputs. */
export interface StateSpaceGain {
  kind: 'stateSpace'
  a: number[][]
  b: number[][]
  c: number[][]
  d: number[][]
  /** names of the channels, as in G[rate, torque]; [] where they are only counted */
  inputs: string[]
  outputs: string[]
  sampleTime?: number
}

/** b0 b1 b2 a0 a1 a2 in falling powers of z: (b0 + b1 z^-1 + b2 z^-2) / (a0 + a1 z^-1 + a2 z^-2). */
export type SecondOrderSection = [number, number, number, number, number, number]
export interface SectionsGain { kind: 'sections', sections: SecondOrderSection[], gain: number, sampleTime: number }

export interface ModalGain {
  kind: 'modal'
  frequencyUnit: FrequencyUnit
  /** 0 where the outputs are positions, 1 rates, 2 accelerations */
  derivative: 0 | 1 | 2
  modes: ModalMode[]
  rigid: RigidTerm[]
  inputs: string[]
  outputs: string[]
}

/** Frequencies of the points in the unit of the loop's input. */
export interface MeasuredGain extends StatedPoles { kind: 'measured', points: MeasuredPoint[], averages?: number }

/** What is stated of the poles of a measured gain itself; without it the closed-loop verdict over it stays undetermined. */
export interface StatedPoles {
  /** beyond the stability boundary */
  openLoopUnstablePoles?: number
  /** at s = 0 (or z = 1) */
  openLoopOriginPoles?: number
}

/** exp(-s T). In samples: of the loop's sample time, whole or not. */
export interface DeadTimeGain { kind: 'deadTime', deadTime: number, unit: 's' | 'samples' }

/**
 * How the output of a sampled controller reaches the continuous plant:
 * zeroOrder: kept over the sample time. pwmSingleUpdate: both edges of a pulse centred in the switching period (the sample time) are moved by one update.
 * pwmDoubleUpdate: one update an edge, the sample time half the switching period, averaged over rising and falling halves.
 */
export type HoldKind = 'zeroOrder' | 'pwmSingleUpdate' | 'pwmDoubleUpdate'
export interface HoldGain {
  kind: 'hold'
  hold: HoldKind
  sampleTime: number
  /** steady duty ratio, 0 to 1, of the pwm kinds. @default 0.5 */
  duty?: number
}

/** The gain of one block in one condition as the engine takes it: numbers only. */
export type BlockGain
  = ExpressionGain | CoefficientsGain | ZerosPolesGain | StateSpaceGain | SectionsGain | ModalGain | MeasuredGain | DeadTimeGain | HoldGain

export type BlockKind = BlockGain['kind']

/** Matrices in an uploaded CSV or JSON file. */
export interface StateSpaceDefinition {
  kind: 'stateSpace'
  uploadId: number
  /** which of several sets of matrices in the file, by its name there; null where the file holds one */
  set: string | null
  /** number of states where the file holds [A B; C D] or stacked plain matrices; null where each matrix is named */
  states: number | null
  inputs: string[]
  outputs: string[]
  sampleTime?: number
}

/** Second-order sections as typed: each cell the text of a number or of a fraction of two, as in 16384/32768. */
export interface SectionsDefinition { kind: 'sections', rows: string[][], gain: string, sampleTime: number }

export interface MeasuredBlockDefinition extends StatedPoles { kind: 'measured', uploadId: number, mapping: MeasurementMapping, averages?: number }

/** The gain of a block as it is stored. */
export type BlockDefinition
  = ExpressionGain | CoefficientsGain | ZerosPolesGain | StateSpaceDefinition | SectionsDefinition | ModalGain | MeasuredBlockDefinition | DeadTimeGain | HoldGain

/** A named part of a system that loop gains are built from. */
export interface Block extends Versioned {
  systemId: number
  /** a name as expressions take it; not that of a parameter */
  name: string
  role: BlockRole
  unitIn: string
  unitOut: string
  notes: string
  position: number
  /** its gain wherever a condition has none of its own */
  definition: BlockDefinition | null
  /** by operating condition id */
  byCondition: Record<number, BlockDefinition>
}

/** A block with what depends on it, as GET /api/systems/[systemId]/blocks answers. */
export interface BlockInUse extends Block {
  /** loops with a source that names it, directly or by another block */
  loopIds: number[]
  /** blocks whose expressions name it */
  blockNames: string[]
}

/** What an uploaded file of matrices holds, as POST /api/systems/[systemId]/matrices answers. */
export interface MatricesFound {
  sets: {
    /** as a StateSpaceDefinition names it in `set` */
    name: string
    states: number
    inputCount: number
    outputCount: number
    /** names of the channels; [] where the file has none */
    inputs: string[]
    outputs: string[]
    /** s, where the file says that the set is sampled */
    sampleTime: number | null
  }[]
  /** every fault by its line, 0 for the file as a whole; then there are no sets */
  problems: { line: number, message: string }[]
}
