import { readSectionNumber } from '#shared/sources/readSectionNumber'
import type { BlockDefinition, ModalGain } from '#shared/types/block'
import { channelNames } from '~/utils/channelNames'
import { parseNumberList } from '~/utils/parseNumberList'
import { parseNumberText } from '~/utils/parseNumberText'
import { parseRoots } from '~/utils/parseRoots'
import { FieldReader } from './FieldReader'
import type { TypedGain, TypedMode, TypedRigidTerm } from './TypedGain'
import type { TypedProblem } from './TypedSource'

const notNegative = (value: number) => value < 0 ? 'A dead time is not negative.' : null
const wholeNumber = (value: number) => Number.isInteger(value) && value >= 0 ? null : 'This is a whole number, zero or above.'
const positive = (what: string) => (value: number) => value > 0 ? null : `${what} is above zero.`
const given = (name: string, value: number | undefined) => value === undefined ? {} : { [name]: value }
const isBlank = (cells: readonly string[]) => cells.every(cell => cell.trim() === '')

/** The gain that was typed, or every field that cannot be read, by its path in the definition: 'modes[2].damping'. */
export function readTypedGain(typed: TypedGain): { definition: BlockDefinition } | { problems: TypedProblem[] } {
  const reader = new FieldReader()
  const definition = readKind(typed, reader)
  return reader.problems.length > 0 || definition === null ? { problems: reader.problems } : { definition }
}

function readKind(typed: TypedGain, reader: FieldReader): BlockDefinition | null {
  const { kind } = typed
  const needsSampleTime = kind === 'sections' || kind === 'hold'
  const sampled = typed.sampled && !['modal', 'measured', 'deadTime'].includes(kind)
  const sampleTime = needsSampleTime || sampled ? reader.requiredTime('sampleTime', typed.sampleTime, 'the sample time', positive('The sample time')) : undefined
  const deadTime = kind === 'coefficients' || kind === 'zerosPoles' ? reader.optionalTime('deadTime', typed.deadTime, notNegative) : undefined
  const timing = { ...given('deadTime', deadTime), ...given('sampleTime', sampleTime) }
  switch (kind) {
    case 'expression':
      if (typed.expression.trim() === '') reader.fault('expression', 'Type the gain of the block.')
      return { kind, expression: typed.expression, ...timing }
    case 'coefficients': {
      if (typed.numerator.trim() === '') reader.fault('numerator', 'Type the coefficients, highest power first.')
      if (typed.denominator.trim() === '') reader.fault('denominator', 'Type the coefficients, highest power first.')
      return { kind, numerator: reader.read('numerator', () => parseNumberList(typed.numerator), []), denominator: reader.read('denominator', () => parseNumberList(typed.denominator), []), ...timing }
    }
    case 'zerosPoles': {
      const zeros = reader.read('zeros', () => parseRoots(typed.zeros), [])
      const poles = reader.read('poles', () => parseRoots(typed.poles), [])
      return { kind, zeros, poles, gain: reader.required('gain', typed.gain, 'the gain: the factor before the products of (s - zero) and (s - pole)'), ...timing }
    }
    case 'stateSpace':
      if (typed.uploadId === null) reader.fault('uploadId', 'Choose the file of the matrices.')
      return {
        kind, uploadId: typed.uploadId ?? 0, set: typed.set, states: typed.states,
        inputs: reader.read('inputs', () => channelNames(typed.inputs).names, []), outputs: reader.read('outputs', () => channelNames(typed.outputs).names, []), ...timing,
      }
    case 'sections':
      return readSections(typed, sampleTime ?? 0, reader)
    case 'modal':
      return readModal(typed, reader)
    case 'measured': {
      const averages = reader.optional('averages', typed.averages, value => Number.isInteger(value) && value > 0 ? null : 'This is a whole number above zero.')
      const openLoopUnstablePoles = reader.optional('openLoopUnstablePoles', typed.unstablePoles, wholeNumber)
      const openLoopOriginPoles = reader.optional('openLoopOriginPoles', typed.originPoles, wholeNumber)
      if (typed.mapping === null || typed.uploadId === null) {
        reader.fault('mapping', 'Choose the file of the sweep, and say what its columns are.')
        return null
      }
      return { kind, uploadId: typed.uploadId, mapping: typed.mapping, ...given('averages', averages), ...given('openLoopUnstablePoles', openLoopUnstablePoles), ...given('openLoopOriginPoles', openLoopOriginPoles) }
    }
    case 'deadTime':
      return typed.deadTimeUnit === 's'
        ? { kind, deadTime: reader.requiredTime('deadTime', typed.deadTime, 'the dead time', notNegative), unit: 's' }
        : { kind, deadTime: reader.required('deadTime', typed.deadTime, 'the number of samples', notNegative), unit: 'samples' }
    case 'hold': {
      const duty = typed.hold === 'zeroOrder' ? undefined : reader.optional('duty', typed.duty, value => value >= 0 && value <= 1 ? null : 'The duty ratio is from 0 to 1.')
      return { kind, hold: typed.hold, sampleTime: sampleTime ?? 0, ...given('duty', duty) }
    }
  }
}

/** The texts of the cells are the definition: they are kept as typed. */
function readSections(typed: TypedGain, sampleTime: number, reader: FieldReader): BlockDefinition {
  const rows = typed.rows.filter(row => !isBlank(row.filter((_, column) => column !== 3)))
  if (rows.length === 0) reader.fault('rows', 'Type at least one section.')
  for (const [row, cells] of typed.rows.entries()) {
    if (!rows.includes(cells)) continue
    for (const [column, text] of cells.entries()) {
      if (text.trim() === '') reader.fault(`rows[${row}][${column}]`, `Type ${coefficientNames[column]} of section ${row + 1}; 0 where it has none.`)
      else if (readSectionNumber(text) === null) reader.fault(`rows[${row}][${column}]`, `Section ${row + 1}, ${coefficientNames[column]}: '${text.trim()}' is not a number and no fraction of two. Write it like -0.98 or 16384/32768.`)
    }
  }
  const gain = typed.gain.trim() === '' ? '1' : typed.gain.trim()
  if (readSectionNumber(gain) === null) reader.fault('gain', `'${gain}' is not a number and no fraction of two.`)
  return { kind: 'sections', rows: rows.map(row => row.map(cell => cell.trim())), gain, sampleTime }
}

const coefficientNames = ['b0', 'b1', 'b2', 'a0', 'a1', 'a2']

function readModal(typed: TypedGain, reader: FieldReader): ModalGain {
  const inputs = reader.read('inputs', () => channelNames(typed.inputs), { names: [], count: 1 })
  const outputs = reader.read('outputs', () => channelNames(typed.outputs), { names: [], count: 1 })
  const numberOf = (path: string, text: string, what: string, field: string, more = '', check?: (value: number) => string | null) =>
    reader.required(path, text, `the ${field} of ${what}${more}`, check, `${what.charAt(0).toUpperCase()}${what.slice(1)}, ${field}: `)
  const gains = (path: string, what: string, row: { gainIn: string[], gainOut: string[] }) => {
    const list = (side: 'gainIn' | 'gainOut', count: number) => Array.from({ length: count }, (_, index) =>
      numberOf(`${path}.${side}[${index}]`, row[side][index] ?? '', what, `gain ${side === 'gainIn' ? 'in' : 'out'}${count > 1 ? ` ${index + 1}` : ''}`, '; 0 where it has none'))
    return { gainIn: list('gainIn', inputs.count), gainOut: list('gainOut', outputs.count) }
  }
  const isTyped = (mode: TypedMode) => !isBlank([mode.name, mode.frequency, mode.damping, ...mode.gainIn, ...mode.gainOut])
  const isTypedTerm = (term: TypedRigidTerm) => !isBlank([...term.gainIn, ...term.gainOut])
  // By their place on the screen, so that a problem stands at its row.
  const modes = typed.modes.flatMap((mode, index) => {
    if (!isTyped(mode)) return []
    const path = `modes[${index}]`
    const what = `mode ${index + 1}`
    const frequency = numberOf(`${path}.frequency`, mode.frequency, what, 'frequency', '', positive('The frequency of a mode'))
    const damping = numberOf(`${path}.damping`, inRatio(mode.damping, typed.dampingUnit), what, 'damping')
    return [{ name: mode.name.trim() === '' ? String(index + 1) : mode.name.trim(), frequency, damping, ...gains(path, what, mode) }]
  })
  const rigid = typed.rigid.flatMap((term, index) => isTypedTerm(term)
    ? [{ power: Number(term.power) as 0 | -1 | -2, ...gains(`rigid[${index}]`, `rigid term ${index + 1}`, term) }]
    : [])
  if (modes.length === 0 && rigid.length === 0) reader.fault('modes', 'Type at least one mode or one rigid term.')
  return { kind: 'modal', frequencyUnit: typed.frequencyUnit, derivative: Number(typed.derivative) as 0 | 1 | 2, modes, rigid, inputs: inputs.names, outputs: outputs.names }
}

/** As a decimal, so that 0.7 % is the double nearest to 0.007. */
function inRatio(text: string, unit: TypedGain['dampingUnit']): string {
  if (unit === 'ratio' || Number.isNaN(parseNumberText(text.replace('%', '')) ?? Number.NaN)) return text
  const [mantissa, exponent = '0'] = text.trim().replace(/\s*%$/, '').toLowerCase().split('e')
  return `${mantissa}e${Number(exponent) - 2}`
}
