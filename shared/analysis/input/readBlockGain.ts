import type { BlockGain, BlockKind, DeadTimeGain, ExpressionGain, HoldGain, HoldKind, MeasuredGain, SectionsGain, SecondOrderSection } from '../../types/block'
import { AnalysisInputError } from '../AnalysisInputError'
import { describeValue } from './describeValue'
import { inputLimits } from './inputLimits'
import { isGiven } from './isGiven'
import { readCoefficients } from './readCoefficients'
import { readList } from './readList'
import { readMeasuredPoints } from './readMeasuredResponse'
import { readModalGain } from './readModalGain'
import { readNumber } from './readNumber'
import { readRecord } from './readRecord'
import { readStateSpace } from './readStateSpace'
import { readTiming } from './readTiming'
import { readWholeNumber } from './readWholeNumber'
import { readZerosPoles } from './readZerosPoles'

const blockKinds: readonly BlockKind[] = ['expression', 'coefficients', 'zerosPoles', 'stateSpace', 'sections', 'modal', 'measured', 'deadTime', 'hold']
const holdKinds: readonly HoldKind[] = ['zeroOrder', 'pwmSingleUpdate', 'pwmDoubleUpdate']

/** Fields of each kind, without `kind`. */
const fieldsOf: Record<BlockKind, readonly string[]> = {
  expression: ['expression', 'sampleTime'],
  coefficients: ['numerator', 'denominator', 'deadTime', 'sampleTime'],
  zerosPoles: ['zeros', 'poles', 'gain', 'deadTime', 'sampleTime'],
  stateSpace: ['a', 'b', 'c', 'd', 'inputs', 'outputs', 'sampleTime'],
  sections: ['sections', 'gain', 'sampleTime'],
  modal: ['frequencyUnit', 'derivative', 'modes', 'rigid', 'inputs', 'outputs'],
  measured: ['points', 'averages', 'openLoopUnstablePoles', 'openLoopOriginPoles'],
  deadTime: ['deadTime', 'unit'],
  hold: ['hold', 'sampleTime', 'duty'],
}

/**
 * The gain of one block, checked: only fields of its kind, each of its type and size. A field that is null counts as left out.
 *
 * @throws AnalysisInputError with the path in the block, as in 'sections[3][2]'
 */
export function readBlockGain(value: unknown): BlockGain {
  const record = readRecord(value, '', 'A block')
  const kind = blockKinds.find(known => known === record.kind)
  if (kind === undefined) throw new AnalysisInputError(`kind must be one of ${blockKinds.join(', ')}, not ${describeValue(record.kind)}.`, 'kind')
  const stranger = Object.keys(record).find(field => field !== 'kind' && isGiven(record[field]) && !fieldsOf[kind].includes(field))
  if (stranger !== undefined) {
    throw new AnalysisInputError(`${stranger.slice(0, 40)} does not go with a block of kind ${kind}: it takes ${fieldsOf[kind].join(', ')}.`, stranger.slice(0, 40))
  }
  switch (kind) {
    case 'expression': return readExpressionGain(record)
    case 'coefficients': return { kind, ...readCoefficients(record) }
    case 'zerosPoles': return { kind, ...readZerosPoles(record) }
    case 'stateSpace': return readStateSpace(record)
    case 'sections': return readSections(record)
    case 'modal': return readModalGain(record)
    case 'measured': return readMeasured(record)
    case 'deadTime': return readDeadTime(record)
    case 'hold': return readHold(record)
  }
}

function readExpressionGain(record: Record<string, unknown>): ExpressionGain {
  const { expression } = record
  if (typeof expression !== 'string') throw new AnalysisInputError(`expression must be text, not ${describeValue(expression)}.`, 'expression')
  if (expression.length > inputLimits.expressionLength) {
    throw new AnalysisInputError(`expression has ${expression.length} characters; at most ${inputLimits.expressionLength} are read.`, 'expression')
  }
  if (expression.trim() === '') throw new AnalysisInputError('expression is empty.', 'expression')
  const { sampleTime } = readTiming({ sampleTime: record.sampleTime })
  return { kind: 'expression', expression, ...sampleTime !== undefined && { sampleTime } }
}

function readSections(record: Record<string, unknown>): SectionsGain {
  const sections = readList(record.sections, 'sections', 'second-order sections [b0, b1, b2, a0, a1, a2]', 1, inputLimits.sections).map((entry, index): SecondOrderSection => {
    const path = `sections[${index}]`
    const row = readList(entry, path, 'the six coefficients b0, b1, b2, a0, a1, a2', 6, 6)
    const [b0, b1, b2, a0, a1, a2] = row.map((cell, column) => readNumber(cell, `${path}[${column}]`)) as SecondOrderSection
    if (a0 === 0) throw new AnalysisInputError(`${path} has a0 = 0: its output would depend on its own next value.`, `${path}[3]`)
    return [b0, b1, b2, a0, a1, a2]
  })
  return { kind: 'sections', sections, gain: isGiven(record.gain) ? readNumber(record.gain, 'gain') : 1, sampleTime: neededSampleTime(record, 'Second-order sections are in z: give') }
}

function readMeasured(record: Record<string, unknown>): MeasuredGain {
  const points = readMeasuredPoints(record.points, 'points')
  const poles = (field: 'openLoopUnstablePoles' | 'openLoopOriginPoles') => isGiven(record[field]) && { [field]: readWholeNumber(record[field], field, 0, inputLimits.order) }
  return {
    kind: 'measured', points, ...isGiven(record.averages) && { averages: readWholeNumber(record.averages, 'averages', 1, 1e9) },
    ...poles('openLoopUnstablePoles'), ...poles('openLoopOriginPoles'),
  }
}

function readDeadTime(record: Record<string, unknown>): DeadTimeGain {
  const deadTime = readNumber(record.deadTime, 'deadTime')
  if (deadTime < 0) throw new AnalysisInputError(`deadTime is ${deadTime}: a loop cannot answer before it is asked. Give 0 or more.`, 'deadTime')
  const { unit } = record
  if (unit !== 's' && unit !== 'samples') throw new AnalysisInputError(`unit must be "s" or "samples", not ${describeValue(unit)}.`, 'unit')
  return { kind: 'deadTime', deadTime, unit }
}

function readHold(record: Record<string, unknown>): HoldGain {
  const hold = holdKinds.find(known => known === record.hold)
  if (hold === undefined) throw new AnalysisInputError(`hold must be one of ${holdKinds.join(', ')}, not ${describeValue(record.hold)}.`, 'hold')
  const sampleTime = neededSampleTime(record, 'A hold needs')
  if (!isGiven(record.duty)) return { kind: 'hold', hold, sampleTime }
  if (hold === 'zeroOrder') throw new AnalysisInputError('duty goes with the pwm kinds of hold only.', 'duty')
  const duty = readNumber(record.duty, 'duty')
  if (duty < 0 || duty > 1) throw new AnalysisInputError(`duty is ${duty}: a duty ratio lies between 0 and 1.`, 'duty')
  return { kind: 'hold', hold, sampleTime, duty }
}

function neededSampleTime(record: Record<string, unknown>, words: string): number {
  const { sampleTime } = readTiming({ sampleTime: record.sampleTime })
  if (sampleTime === undefined) throw new AnalysisInputError(`${words} the sample time in seconds.`, 'sampleTime')
  return sampleTime
}
