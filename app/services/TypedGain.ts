import type { BlockDefinition, BlockKind, HoldKind, ModalGain } from '#shared/types/block'
import type { FrequencyUnit } from '#shared/types/analysis'
import type { MeasurementMapping } from '#shared/types/source'
import { channelsAsText } from '~/utils/channelsAsText'
import { rootsAsText } from '~/utils/rootsAsText'
import { timeText } from '~/utils/timeText'

export interface TypedMode {
  name: string
  frequency: string
  damping: string
  /** one for each channel */
  gainIn: string[]
  gainOut: string[]
}

export interface TypedRigidTerm {
  power: '0' | '-1' | '-2'
  gainIn: string[]
  gainOut: string[]
}

/** A gain of a block as it stands in the editor: every field of every kind is a text, so that nothing typed is lost by changing the kind. */
export interface TypedGain {
  kind: BlockKind
  /** in z, with the sample time */
  sampled: boolean
  sampleTime: string
  expression: string
  numerator: string
  denominator: string
  zeros: string
  poles: string
  gain: string
  /** dead time beside a model, or the block's own */
  deadTime: string
  deadTimeUnit: 's' | 'samples'
  /** second-order sections: b0 b1 b2 a0 a1 a2 */
  rows: string[][]
  frequencyUnit: FrequencyUnit
  dampingUnit: 'ratio' | '%'
  derivative: '0' | '1' | '2'
  modes: TypedMode[]
  rigid: TypedRigidTerm[]
  /** channels, by names or numbers */
  inputs: string
  outputs: string
  /** file of matrices, or of a measured response */
  uploadId: number | null
  fileName: string
  set: string | null
  states: number | null
  mapping: MeasurementMapping | null
  averages: string
  /** stated of a measured response */
  unstablePoles: string
  originPoles: string
  hold: HoldKind
  duty: string
}

export const emptyGain = (frequencyUnit: FrequencyUnit): TypedGain => ({
  kind: 'expression', sampled: false, sampleTime: '', expression: '', numerator: '', denominator: '', zeros: '', poles: '', gain: '', deadTime: '', deadTimeUnit: 's',
  rows: [['', '', '', '1', '', '']], frequencyUnit, dampingUnit: 'ratio', derivative: '0', modes: [emptyMode(1, 1)], rigid: [], inputs: '', outputs: '',
  uploadId: null, fileName: '', set: null, states: null, mapping: null, averages: '', unstablePoles: '', originPoles: '', hold: 'zeroOrder', duty: '',
})

export const emptyMode = (inputs: number, outputs: number): TypedMode =>
  ({ name: '', frequency: '', damping: '', gainIn: Array.from({ length: inputs }, () => ''), gainOut: Array.from({ length: outputs }, () => '') })

const asText = (value: number | undefined) => value === undefined ? '' : String(value)

/** The texts of a stored gain. */
export function typedGain(definition: BlockDefinition, frequencyUnit: FrequencyUnit): TypedGain {
  const sampleTime = 'sampleTime' in definition ? definition.sampleTime : undefined
  const common: TypedGain = { ...emptyGain(frequencyUnit), kind: definition.kind, sampled: sampleTime !== undefined, sampleTime: timeText(sampleTime) }
  switch (definition.kind) {
    case 'expression':
      return { ...common, expression: definition.expression }
    case 'coefficients':
      return { ...common, numerator: definition.numerator.join(' '), denominator: definition.denominator.join(' '), deadTime: timeText(definition.deadTime) }
    case 'zerosPoles':
      return { ...common, zeros: rootsAsText(definition.zeros), poles: rootsAsText(definition.poles), gain: String(definition.gain), deadTime: timeText(definition.deadTime) }
    case 'stateSpace':
      return {
        ...common, uploadId: definition.uploadId, set: definition.set, states: definition.states,
        inputs: channelsAsText(definition.inputs), outputs: channelsAsText(definition.outputs),
      }
    case 'sections':
      return { ...common, rows: definition.rows.map(row => [...row]), gain: definition.gain }
    case 'modal':
      return { ...common, ...typedModal(definition) }
    case 'measured':
      return { ...common, uploadId: definition.uploadId, mapping: definition.mapping, averages: asText(definition.averages), unstablePoles: asText(definition.openLoopUnstablePoles), originPoles: asText(definition.openLoopOriginPoles) }
    case 'deadTime':
      return { ...common, deadTime: definition.unit === 's' ? timeText(definition.deadTime) : String(definition.deadTime), deadTimeUnit: definition.unit }
    case 'hold':
      return { ...common, hold: definition.hold, duty: asText(definition.duty) }
  }
}

function typedModal({ frequencyUnit, derivative, modes, rigid, inputs, outputs }: ModalGain): Partial<TypedGain> {
  const first = modes[0] ?? rigid[0]
  const texts = (values: readonly number[]) => values.map(String)
  return {
    frequencyUnit, dampingUnit: 'ratio', derivative: `${derivative}`,
    modes: modes.map(mode => ({ name: mode.name, frequency: String(mode.frequency), damping: String(mode.damping), gainIn: texts(mode.gainIn), gainOut: texts(mode.gainOut) })),
    rigid: rigid.map(term => ({ power: `${term.power}`, gainIn: texts(term.gainIn), gainOut: texts(term.gainOut) })),
    inputs: channelsAsText(inputs, first?.gainIn.length ?? 1), outputs: channelsAsText(outputs, first?.gainOut.length ?? 1),
  }
}
