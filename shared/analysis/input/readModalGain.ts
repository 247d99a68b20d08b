import type { ModalGain, ModalMode, RigidTerm } from '../../types/block'
import { AnalysisInputError } from '../AnalysisInputError'
import { describeValue } from './describeValue'
import { inputLimits } from './inputLimits'
import { isGiven } from './isGiven'
import { readChannelNames } from './readChannelNames'
import { readList } from './readList'
import { readNumber } from './readNumber'
import { readRecord } from './readRecord'

/** Numbers of inputs and outputs, set by the first row that has them. */
type Counts = { gainIn?: number, gainOut?: number }

/**
 * A modal table: modes with a frequency above 0, damping ratio, a gain for each input and each output, and rigid terms.
 *
 * @throws AnalysisInputError with the path in the block, as in 'modes[3].gainIn[1]'
 */
export function readModalGain(record: Record<string, unknown>): ModalGain {
  const { frequencyUnit, derivative } = record
  if (frequencyUnit !== 'rad/s' && frequencyUnit !== 'Hz') throw new AnalysisInputError(`frequencyUnit must be "rad/s" or "Hz", not ${describeValue(frequencyUnit)}.`, 'frequencyUnit')
  if (derivative !== 0 && derivative !== 1 && derivative !== 2) {
    throw new AnalysisInputError(`derivative must be 0 (outputs are positions), 1 (rates) or 2 (accelerations), not ${describeValue(derivative)}.`, 'derivative')
  }
  const counts: Counts = {}
  const modes = readList(isGiven(record.modes) ? record.modes : [], 'modes', 'modes', 0, inputLimits.modes).map((entry, index) => readMode(entry, `modes[${index}]`, counts))
  const rigid = readList(isGiven(record.rigid) ? record.rigid : [], 'rigid', 'rigid terms', 0, inputLimits.rigidTerms).map((entry, index) => readRigidTerm(entry, `rigid[${index}]`, counts))
  if (modes.length + rigid.length === 0) throw new AnalysisInputError('The table is empty: give at least one mode or rigid term.', 'modes')
  return {
    kind: 'modal', frequencyUnit, derivative, modes, rigid,
    inputs: readChannelNames(record.inputs, 'inputs', counts.gainIn ?? 0), outputs: readChannelNames(record.outputs, 'outputs', counts.gainOut ?? 0),
  }
}

function readMode(value: unknown, path: string, counts: Counts): ModalMode {
  const record = readRecord(value, path, path)
  const name = isGiven(record.name) ? record.name : ''
  if (typeof name !== 'string' || name.length > inputLimits.nameLength) throw new AnalysisInputError(`${path}.name must be text of at most ${inputLimits.nameLength} characters.`, `${path}.name`)
  const frequency = readNumber(record.frequency, `${path}.frequency`)
  if (frequency <= 0) throw new AnalysisInputError(`${path}.frequency is ${frequency}: a mode has a frequency above 0. A rigid body is a rigid term, of power -2.`, `${path}.frequency`)
  const damping = readNumber(record.damping, `${path}.damping`)
  return { name, frequency, damping, gainIn: readGains(record, 'gainIn', path, counts), gainOut: readGains(record, 'gainOut', path, counts) }
}

function readRigidTerm(value: unknown, path: string, counts: Counts): RigidTerm {
  const record = readRecord(value, path, path)
  const { power } = record
  if (power !== 0 && power !== -1 && power !== -2) throw new AnalysisInputError(`${path}.power must be 0, -1 or -2, not ${describeValue(power)}.`, `${path}.power`)
  return { power, gainIn: readGains(record, 'gainIn', path, counts), gainOut: readGains(record, 'gainOut', path, counts) }
}

function readGains(record: Record<string, unknown>, field: 'gainIn' | 'gainOut', path: string, counts: Counts): number[] {
  const here = `${path}.${field}`
  const what = field === 'gainIn' ? 'gains, one for each input' : 'gains, one for each output'
  const gains = readList(record[field], here, what, 1, inputLimits.channels).map((entry, index) => readNumber(entry, `${here}[${index}]`))
  counts[field] ??= gains.length
  if (gains.length !== counts[field]) throw new AnalysisInputError(`${here} has ${gains.length} gains, ${counts[field]} are needed: as many as in the rows before.`, here)
  return gains
}
