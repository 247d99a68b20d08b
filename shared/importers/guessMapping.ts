import type { MeasuredQuantity } from '../types/analysis'
import type { MeasurementMapping } from '../types/source'
import type { Column } from './Column'
import { parseDecimal } from './parseDecimal'
import type { Table } from './readTable'

/**
 * A first mapping of the columns, from the words of the head and, where they are silent, from the numbers of the first rows.
 * It is a proposal for a person to confirm. Null where no frequency or no pair of values can be made out.
 */
export function guessMapping(table: Table, columns: readonly Column[]): MeasurementMapping | null {
  const words = columns.map(column => `${column.name} ${column.unit}`.toLowerCase())
  const find = (pattern: RegExp, taken: number[]) => words.findIndex((word, index) => !taken.includes(index) && pattern.test(word))
  const named = columns.some(column => !/^column \d+$/.test(column.name))

  const frequencyColumn = named ? find(/freq|omega|ω|\bhz\b|rad\/s|^[fw]\b/, []) : 0
  if (frequencyColumn < 0 || /\b[km]hz\b/.test(words[frequencyColumn]!)) return null
  const frequencyUnit = /rad\/s|omega|ω|^w\b/.test(words[frequencyColumn]!) ? 'rad/s' : 'Hz'
  const coherence = find(/coh|gamma|γ/, [frequencyColumn])
  const taken = [frequencyColumn, coherence]
  const quantity = guessQuantity([...table.comments, ...table.head.flatMap(row => row.cells)].join(' ').toLowerCase())
  const common = { frequencyColumn, frequencyUnit, coherenceColumn: coherence < 0 ? null : coherence, quantity } as const

  const real = find(/\bre(?:al)?\b/, taken)
  const imaginary = find(/\bim(?:ag(?:inary)?)?\b/, taken)
  if (real >= 0 && imaginary >= 0) return { ...common, form: 'real and imaginary', firstColumn: real, secondColumn: imaginary }

  const phase = find(/phase|angle|\barg|°|\bdeg/, taken)
  const size = find(/mag|ampl|gain|\bdb\b|ratio|abs|modulus/, [...taken, phase])
  if (phase >= 0 && size >= 0) {
    const inDecibels = /\bdb\b/.test(words[size]!) || (!/ratio|v\/v/.test(words[size]!) && valuesOf(table, size).some(value => value < 0))
    return { ...common, form: formOf(inDecibels, inRadians(words[phase]!, valuesOf(table, phase))), firstColumn: size, secondColumn: phase }
  }
  return named ? null : guessFromNumbers(table, columns.length, common)
}

type CommonGuess = Pick<MeasurementMapping, 'frequencyColumn' | 'frequencyUnit' | 'coherenceColumn' | 'quantity'>

/** Without a head: frequency, two values, and a fourth column that stays within 0 and 1 as coherence. */
function guessFromNumbers(table: Table, width: number, common: CommonGuess): MeasurementMapping {
  const second = valuesOf(table, 2)
  const fourth = width > 3 ? valuesOf(table, 3) : []
  const coherenceColumn = fourth.length > 0 && fourth.every(value => value >= 0 && value <= 1) ? 3 : null
  const polar = second.some(value => Math.abs(value) > 2 * Math.PI)
  const form = polar ? formOf(valuesOf(table, 1).some(value => value < 0), false) : 'real and imaginary'
  return { ...common, form, firstColumn: 1, secondColumn: 2, coherenceColumn }
}

function guessQuantity(words: string): MeasuredQuantity {
  if (/complementary|closed[ -]loop (?:transfer|response)/.test(words)) return 'complementarySensitivity'
  if (/return difference|1 ?\+ ?l\b/.test(words)) return 'returnDifference'
  return /sensitivity/.test(words) ? 'sensitivity' : 'loopGain'
}

function inRadians(word: string, values: number[]): boolean {
  if (/deg|°/.test(word)) return false
  return /\brad(?!\/s)/.test(word) || (values.length > 0 && values.every(value => Math.abs(value) <= 2 * Math.PI))
}

function formOf(inDecibels: boolean, radians: boolean): MeasurementMapping['form'] {
  if (inDecibels) return radians ? 'dB and radians' : 'dB and degrees'
  return radians ? 'ratio and radians' : 'ratio and degrees'
}

function valuesOf(table: Table, column: number): number[] {
  return table.rows.slice(0, 200).flatMap(row => parseDecimal(row.cells[column] ?? '', table.dialect.decimalComma) ?? [])
}
