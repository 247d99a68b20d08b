import type { Dialect } from './Dialect'
import { guessMatrixDialect } from './guessMatrixDialect'
import type { MatrixName, TypedSet } from './MatrixSet'
import type { MeasurementProblem } from './MeasurementProblem'
import { matrixLimits } from './matrixLimits'
import { parseDecimal } from './parseDecimal'
import { stackPlainRows, type PlainRow } from './stackPlainRows'
import { splitRows, type TableRow } from './splitRows'
import type { PlainShape } from './readMatrices'

const heading = /^([abcd])\s*[:=]?$/i
const statement = /^(condition|set|inputs|outputs|sample[\s_]*time)\b[\s,;:=]*(.*)$/i
const comment = /^\s*(?:#|%|\/\/)/
const blank = /^[\s,;]*$/

/** What the lines of a file say, as far as it is read. */
interface Reading {
  sets: TypedSet[]
  problems: MeasurementProblem[]
  /** rows of numbers below no heading */
  plain: PlainRow[]
  blankLines: ReadonlySet<number>
  /** names and sample time above the first set: of all sets */
  common: Pick<TypedSet, 'inputs' | 'outputs' | 'sampleTime'>
  set: TypedSet | null
  matrix: MatrixName | null
  /** the 'condition' line of the set that the plain rows to come belong to */
  plainSet: PlainRow['set']
}

/**
 * Sets of matrices in a table: a line 'A', the rows of A, a line 'B' and so on. A line 'condition, C1' begins the next set and names it; so does a second 'A'.
 * Lines 'inputs, torque' and 'outputs, rate, angle' name the channels and 'sample time, 0.001' makes it a sampled one: of their set, or of all where they
 * stand above the first. A file of numbers alone holds [A B; C D] with `shape.states` states, several below one another with a blank or a 'condition' line between them, or,
 * where `shape.outputs` is known, nothing between. Cells are separated by comma, semicolon, tabulator or blanks; comments begin with #, % or //.
 */
export function readMatrixText(text: string, shape: PlainShape): { sets: TypedSet[] } | { problems: MeasurementProblem[] } {
  const typed = text.split(/\r\n|\n|\r/)
  if (typed.length > matrixLimits.lines) return { problems: [{ line: 0, message: `The file has ${typed.length} lines; at most ${matrixLimits.lines} are read.` }] }
  const blankLines = new Set(typed.flatMap((line, index) => blank.test(line) ? [index + 1] : []))
  const lines = typed.map(line => comment.test(line) ? '' : line)
  const { dialect, blanks } = guessMatrixDialect(lines)
  const rows = splitRows((blanks ? lines.map(line => line.trim().replace(/[ \t]+/g, '\t')) : lines).join('\n'), dialect)
  if ('message' in rows) return { problems: [rows] }
  const reading: Reading = { sets: [], problems: [], plain: [], blankLines, common: { inputs: null, outputs: null }, set: null, matrix: null, plainSet: null }
  for (const row of rows) readRow({ line: row.line, cells: withoutEmptyEnd(row.cells) }, dialect, reading)
  const { sets, problems, plain, common } = reading
  if (problems.length > 0) return { problems }
  if (sets.some(set => Object.keys(set.matrices).length > 0)) {
    const first = plain[0]
    if (first) return { problems: [{ line: first.line, message: 'these numbers stand below no heading A, B, C or D' }] }
    return { sets: sets.map(set => withCommon(set, common)) }
  }
  const stacked = stackPlainRows(plain, shape)
  if ('problems' in stacked) return stacked
  return { sets: stacked.sets.map(set => withCommon({ ...set, ...namesOf(sets, set.name) }, common)) }
}

/** Spreadsheets fill short rows with empty cells. */
function withoutEmptyEnd(cells: string[]): string[] {
  const last = cells.findLastIndex(cell => cell !== '')
  return cells.slice(0, last + 1)
}

function withCommon(set: TypedSet, common: Reading['common']): TypedSet {
  const sampleTime = set.sampleTime ?? common.sampleTime
  return { ...set, inputs: set.inputs ?? common.inputs, outputs: set.outputs ?? common.outputs, ...(sampleTime !== undefined && { sampleTime }) }
}

/** What was said of a set of plain numbers in the lines below its 'condition' line. */
function namesOf(sets: readonly TypedSet[], name: string | null): Partial<TypedSet> {
  const said = sets.find(set => set.name !== null && set.name === name)
  return said ? { inputs: said.inputs, outputs: said.outputs, ...(said.sampleTime !== undefined && { sampleTime: said.sampleTime }) } : {}
}

function readRow(row: TableRow, dialect: Dialect, reading: Reading): void {
  const { line, cells } = row
  const text = cells.join(' ')
  const found = heading.exec(text)
  if (found) return beginMatrix(found[1]!.toLowerCase() as MatrixName, line, reading)
  const said = statement.exec(text)
  if (said) return readStatement(said[1]!.toLowerCase(), said[2]!.trim(), line, dialect, reading)
  const values = cells.map(cell => parseDecimal(cell, dialect.decimalComma))
  if (values.every(value => value !== null)) return addRow(line, values, reading)
  const stray = values.indexOf(null)
  const cell = cells[stray] ?? ''
  if (stray === 0 && /^[A-Za-z]/.test(cell)) {
    reading.problems.push({ line, message: `"${cell.slice(0, 40)}" is neither a number nor one of A, B, C, D, condition, inputs, outputs, sample time` })
  }
  else reading.problems.push({ line, message: `${placeOf(reading)}column ${stray + 1} ${cell === '' ? 'is empty' : `"${cell.slice(0, 40)}" is no number`}` })
}

/** 'row 3 of A: ' for the row that comes next. */
function placeOf({ set, matrix }: Reading): string {
  return set && matrix ? `row ${(set.matrices[matrix]?.rows.length ?? 0) + 1} of ${matrix.toUpperCase()}: ` : ''
}

function beginSet(name: string, line: number, reading: Reading): void {
  if (name === '') reading.problems.push({ line, message: 'a condition line needs a name, as in "condition, C1"' })
  reading.set = { name, line, matrices: {}, inputs: null, outputs: null }
  reading.sets.push(reading.set)
  reading.matrix = null
  reading.plainSet = { name, line }
}

function beginMatrix(name: MatrixName, line: number, reading: Reading): void {
  const set = reading.set
  if (set?.matrices[name] && name !== 'a') {
    reading.problems.push({ line, message: `${name.toUpperCase()} stands twice in this set: the next set begins with A or a condition line` })
  }
  if (set === null || set.matrices[name]) {
    reading.set = { name: null, line, matrices: {}, inputs: null, outputs: null }
    reading.sets.push(reading.set)
  }
  reading.set!.matrices[name] = { line, rows: [] }
  reading.matrix = name
}

function readStatement(word: string, rest: string, line: number, dialect: Dialect, reading: Reading): void {
  if (word === 'condition' || word === 'set') return beginSet(rest, line, reading)
  const subject = reading.set ?? reading.common
  if (word === 'inputs' || word === 'outputs') subject[word] = { line, names: rest.split(/[\s,;]+/).filter(name => name !== '') }
  else {
    const value = parseDecimal(rest, dialect.decimalComma)
    if (value === null || value <= 0) reading.problems.push({ line, message: 'the sample time must be a number over 0, in seconds' })
    else subject.sampleTime = value
  }
}

function addRow(line: number, values: number[], { set, matrix, plain, blankLines, plainSet }: Reading): void {
  if (set && matrix) {
    set.matrices[matrix]?.rows.push({ line, values })
    return
  }
  const before = plain.at(-1)?.line ?? line
  let afterBlank = false
  for (let next = before + 1; next < line && !afterBlank; next++) afterBlank = blankLines.has(next)
  plain.push({ line, values, set: plainSet, afterBlank })
}
