import { checkMatrices } from './checkMatrices'
import { matrixLimits } from './matrixLimits'
import type { MatrixSet, TypedSet } from './MatrixSet'
import type { MeasurementProblem } from './MeasurementProblem'
import { measurementLimits } from './measurementLimits'
import { readMatrixJson } from './readMatrixJson'
import { readMatrixText } from './readMatrixText'

export interface MatrixReading {
  /** in the order of the file; empty unless all of it is right */
  sets: MatrixSet[]
  problems: MeasurementProblem[]
}

/** What only the reader of a file without headings can know of it. */
export interface PlainShape {
  /** number of states where each set is [A B; C D] in plain numbers; null where each matrix has a heading */
  states: number | null
  /** number of outputs, where several plain sets stand below one another with nothing between them */
  outputs?: number | null
}

/**
 * The sets of state-space matrices in an uploaded file, JSON or a table: see `readMatrixJson` and `readMatrixText`. All or nothing: one fault, and there are
 * no sets but the list of faults by line (0 for what has no line).
 */
export function readMatrices(text: string, shape: PlainShape = { states: null }): MatrixReading {
  if (text.length > measurementLimits.characters) return failed([{ line: 0, message: `The file has ${text.length} characters; at most ${measurementLimits.characters} (20 MB) are read.` }])
  if (text.includes('\0')) return failed([{ line: 0, message: 'This is no text file: export the matrices as comma separated values or as JSON.' }])
  const plain = text.replace(/^\uFEFF/, '')
  if (plain.trim() === '') return failed([{ line: 0, message: 'The file is empty.' }])
  const typed = /^\s*[[{]/.test(plain) ? readMatrixJson(plain) : readMatrixText(plain, shape)
  if ('problems' in typed) return failed(typed.problems)
  if (typed.sets.length > matrixLimits.sets) return failed([{ line: typed.sets[matrixLimits.sets]?.line ?? 0, message: `The file holds ${typed.sets.length} sets of matrices; at most ${matrixLimits.sets} are read.` }])
  return checked(typed.sets)
}

function checked(typed: TypedSet[]): MatrixReading {
  const sets: MatrixSet[] = []
  const problems: MeasurementProblem[] = []
  for (const [index, set] of typed.entries()) {
    const name = set.name ?? `set ${index + 1}`
    if (sets.some(other => other.name === name)) problems.push({ line: set.line, message: `there are two sets named ${name}` })
    const found = checkMatrices(set, name)
    if ('name' in found) sets.push(found)
    // Where there is no line, the name of the set says where the fault is.
    else for (const { line, message } of found) problems.push({ line, message: line === 0 && typed.length > 1 ? `${name}: ${message}` : message })
  }
  return problems.length > 0 ? failed(problems) : { sets, problems: [] }
}

function failed(problems: MeasurementProblem[]): MatrixReading {
  const told = problems.slice(0, measurementLimits.problems)
  if (told.length < problems.length) told.push({ line: 0, message: `and ${problems.length - told.length} more faults` })
  return { sets: [], problems: told }
}
