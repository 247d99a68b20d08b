import type { MeasuredPoint } from '../types/analysis'
import type { MeasurementMapping } from '../types/source'
import type { MeasurementProblem } from './MeasurementProblem'
import { measurementLimits } from './measurementLimits'
import { parseDecimal } from './parseDecimal'
import { readColumns } from './readColumns'
import { readTable, type Table } from './readTable'
import type { TableRow } from './splitRows'

export interface MeasurementReading {
  /** in rising order of frequency, in the mapping's unit; empty unless every row is right */
  points: MeasuredPoint[]
  problems: MeasurementProblem[]
}

/**
 * The points of an uploaded response under a mapping of its columns. All or nothing: one bad row, and there are no points but the
 * list of problems by line number. dB are 20 log10 of the ratio; a file written from high to low frequency is turned round.
 */
export function readMeasurement(text: string, mapping: MeasurementMapping): MeasurementReading {
  const table = readTable(text)
  if ('message' in table) return failed([{ line: table.line ?? 0, message: table.message }])
  const mappingProblem = problemOfMapping(table, mapping)
  if (mappingProblem !== null) return failed([{ line: 0, message: mappingProblem }])
  if (table.rows.length > measurementLimits.rows) {
    return failed([{ line: table.rows[measurementLimits.rows]!.line, message: `The file has ${table.rows.length} rows; at most ${measurementLimits.rows} are read.` }])
  }
  const problems: MeasurementProblem[] = []
  const points: MeasuredPoint[] = []
  const lines: number[] = []
  // A row above the first good one that has a frequency is a bad row, not part of the head.
  const strays = table.head.filter(row => parseDecimal(row.cells[mapping.frequencyColumn] ?? '', table.dialect.decimalComma) !== null)
  for (const row of [...strays, ...table.rows]) {
    const point = readRow(row, mapping, table.dialect.decimalComma)
    if (typeof point === 'string') problems.push({ line: row.line, message: point })
    else {
      points.push(point)
      lines.push(row.line)
    }
  }
  if (problems.length === 0 && falls(points)) {
    points.reverse()
    lines.reverse()
  }
  problems.push(...problemsOfOrder(points, lines))
  if (points.length < 2 && problems.length === 0) problems.push({ line: 0, message: 'The file holds a single row; a response needs at least two.' })
  return problems.length > 0 ? failed(problems) : { points, problems: [] }
}

function failed(problems: MeasurementProblem[]): MeasurementReading {
  const told = [...problems].sort((a, b) => a.line - b.line).slice(0, measurementLimits.problems)
  if (told.length < problems.length) told.push({ line: 0, message: `and ${problems.length - told.length} more rows` })
  return { points: [], problems: told }
}

function problemOfMapping(table: Table, mapping: MeasurementMapping): string | null {
  const width = readColumns(table).length
  const used = [mapping.frequencyColumn, mapping.firstColumn, mapping.secondColumn, ...mapping.coherenceColumn === null ? [] : [mapping.coherenceColumn]]
  const outside = used.find(column => !Number.isInteger(column) || column < 0 || column >= width)
  if (outside !== undefined) return `The mapping names column ${outside + 1}, but the file has ${width} columns.`
  return new Set(used).size < used.length ? 'The mapping names one column twice.' : null
}

/** The point in a row, or what is wrong with it. */
function readRow({ cells }: TableRow, mapping: MeasurementMapping, decimalComma: boolean): MeasuredPoint | string {
  const named: [string, number][] = [['frequency', mapping.frequencyColumn], ...valueNames(mapping), ...mapping.coherenceColumn === null ? [] : [['coherence', mapping.coherenceColumn] as [string, number]]]
  const values: number[] = []
  for (const [name, column] of named) {
    const cell = cells[column] ?? ''
    const value = parseDecimal(cell, decimalComma)
    if (value === null) return cell === '' ? `The ${name} is missing (column ${column + 1}).` : `The ${name} "${cell.slice(0, 40)}" is no number (column ${column + 1}).`
    values.push(value)
  }
  const [frequency, first, second, coherence] = values as [number, number, number, number?]
  if (frequency < 0) return `The frequency ${frequency} is negative.`
  if (coherence !== undefined && (coherence < 0 || coherence > 1)) return `The coherence ${coherence} is outside 0 to 1.`
  const value = toComplex(first, second, mapping.form)
  if (typeof value === 'string') return value
  return { frequency, ...value, ...(coherence !== undefined && { coherence }) }
}

function valueNames({ form, firstColumn, secondColumn }: MeasurementMapping): [string, number][] {
  const [first, second] = form === 'real and imaginary' ? ['real part', 'imaginary part'] : [form.startsWith('dB') ? 'gain in dB' : 'ratio', 'phase']
  return [[first!, firstColumn], [second!, secondColumn]]
}

function toComplex(first: number, second: number, form: MeasurementMapping['form']): { re: number, im: number } | string {
  if (form === 'real and imaginary') return { re: first, im: second }
  if (form.startsWith('ratio') && first < 0) return `The ratio ${first} is negative: is it in dB?`
  const ratio = form.startsWith('dB') ? 10 ** (first / 20) : first
  if (!Number.isFinite(ratio)) return `The gain ${first} dB is out of range.`
  const angle = form.endsWith('degrees') ? second * Math.PI / 180 : second
  return { re: ratio * Math.cos(angle), im: ratio * Math.sin(angle) }
}

function falls(points: MeasuredPoint[]): boolean {
  return points.length > 1 && points.every((point, index) => index === 0 || point.frequency < points[index - 1]!.frequency)
}

function problemsOfOrder(points: MeasuredPoint[], lines: number[]): MeasurementProblem[] {
  return points.flatMap((point, index): MeasurementProblem[] => {
    const before = points[index - 1]
    if (before === undefined || point.frequency > before.frequency) return []
    const what = point.frequency === before.frequency ? 'repeats that of' : 'is below that of'
    return [{ line: lines[index]!, message: `The frequency ${point.frequency} ${what} line ${lines[index - 1]} (${before.frequency}): each frequency once, in rising order.` }]
  })
}
