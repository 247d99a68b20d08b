import { findFaultyKey } from './findFaultyKey'
import { matrixLimits } from './matrixLimits'
import type { MatrixName, TypedMatrix, TypedNames, TypedSet } from './MatrixSet'
import type { MeasurementProblem } from './MeasurementProblem'

type Read<Value> = Value | { problem: string }
const isProblem = (value: unknown): value is { problem: string } => typeof value === 'object' && value !== null && 'problem' in value
const isRecord = (value: unknown): value is Record<string, unknown> => typeof value === 'object' && value !== null && !Array.isArray(value)

/**
 * Sets of matrices in JSON: one set { A, B, C, D } (letters of either case; rows of numbers) with `inputs`, `outputs` (names) and `sampleTime` if it has them,
 * a list of such sets (with a `name` each if they have one), or a record of them by name.
 */
export function readMatrixJson(text: string): { sets: TypedSet[] } | { problems: MeasurementProblem[] } {
  let value: unknown
  try {
    value = JSON.parse(text)
  }
  catch (error) {
    if (!(error instanceof SyntaxError)) throw error
    return { problems: [{ line: lineOf(error, text), message: `The file is not JSON: ${error.message}.` }] }
  }
  const faulty = findFaultyKey(text)
  if (faulty) return { problems: [{ line: lineAt(faulty.position, text), message: faulty.message }] }
  const entries = entriesOf(value)
  if (entries.length > matrixLimits.sets) return { problems: [{ line: 0, message: `The file holds ${entries.length} sets of matrices; at most ${matrixLimits.sets} are read.` }] }
  const problems: MeasurementProblem[] = []
  const sets = entries.flatMap(([name, entry], index): TypedSet[] => {
    const set = readSet(name, entry)
    if (!isProblem(set)) return [set]
    problems.push({ line: 0, message: entries.length > 1 ? `${name ?? `set ${index + 1}`}: ${set.problem}` : set.problem })
    return []
  })
  if (entries.length === 0) problems.push({ line: 0, message: 'The file holds no matrices.' })
  return problems.length > 0 ? { problems } : { sets }
}

/** The line of a fault that the parser tells by its place; 0 where it tells none. */
function lineOf(error: SyntaxError, text: string): number {
  const place = /position (\d+)/.exec(error.message)
  return place === null ? 0 : lineAt(Number(place[1]), text)
}

const lineAt = (position: number, text: string): number => text.slice(0, position).split('\n').length

function entriesOf(value: unknown): [string | null, unknown][] {
  if (Array.isArray(value)) return value.map(entry => [null, entry])
  if (!isRecord(value)) return []
  const isSet = Object.entries(value).some(([key, entry]) => /^[abcd]$/i.test(key) && !isRecord(entry))
  return isSet ? [[null, value]] : Object.entries(value).map(([name, entry]) => [name.trim(), entry])
}

function readSet(name: string | null, value: unknown): Read<TypedSet> {
  if (name === '') return { problem: 'a set of matrices needs a name that is not blank' }
  if (!isRecord(value)) return { problem: 'must be an object with A, B, C and D' }
  const set: TypedSet = { name, line: 0, matrices: {}, inputs: null, outputs: null }
  for (const [key, entry] of Object.entries(value)) {
    const word = key.toLowerCase()
    if (/^[abcd]$/.test(word)) {
      const matrix = readMatrix(key, entry)
      if (isProblem(matrix)) return matrix
      if (set.matrices[word as MatrixName]) return { problem: `${key.toUpperCase()} stands twice` }
      set.matrices[word as MatrixName] = matrix
    }
    else if (word === 'inputs' || word === 'outputs') {
      const names = readNames(key, entry)
      if (isProblem(names)) return names
      set[word] = names
    }
    else if (word === 'sampletime') {
      if (entry === null) continue
      if (typeof entry !== 'number' || !(entry > 0)) return { problem: 'sampleTime must be a number over 0, in seconds' }
      set.sampleTime = entry
    }
    else if (word === 'name' || word === 'condition') {
      if (typeof entry !== 'string' || entry.trim() === '') return { problem: `${key} must be a text` }
      set.name ??= entry.trim()
    }
    else return { problem: `there is no field "${key.slice(0, 40)}": A, B, C, D, inputs, outputs, sampleTime and name are known` }
  }
  return set
}

function readMatrix(name: string, value: unknown): Read<TypedMatrix> {
  // One number is the matrix of one row and one column.
  const rows = typeof value === 'number' ? [[value]] : value
  if (!Array.isArray(rows)) return { problem: `${name} must be a list of rows` }
  const matrix: TypedMatrix = { line: 0, rows: [] }
  for (const [index, row] of (rows as unknown[]).entries()) {
    if (!Array.isArray(row)) return { problem: `row ${index + 1} of ${name} must be a list of numbers` }
    const stray = row.findIndex(cell => typeof cell !== 'number' || !Number.isFinite(cell))
    if (stray >= 0) return { problem: `row ${index + 1} of ${name}: column ${stray + 1} is no number` }
    matrix.rows.push({ line: 0, values: row as number[] })
  }
  return matrix
}

function readNames(key: string, value: unknown): Read<TypedNames | null> {
  if (value === null) return null
  if (!Array.isArray(value) || value.some(name => typeof name !== 'string')) return { problem: `${key} must be a list of names` }
  return value.length === 0 ? null : { line: 0, names: value as string[] }
}
