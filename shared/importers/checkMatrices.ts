import { matrixLimits } from './matrixLimits'
import type { MatrixName, MatrixSet, TypedMatrix, TypedNames, TypedSet } from './MatrixSet'
import type { MeasurementProblem } from './MeasurementProblem'

const channelName = /^[A-Za-z]\w*$/

/**
 * A set of matrices whose shapes fit (A n by n, B n by inputs, C outputs by n, D outputs by inputs), or every fault of it with its line, the matrix and the row.
 *
 * @param name of the set, as faults tell it
 */
export function checkMatrices(set: TypedSet, name: string): MatrixSet | MeasurementProblem[] {
  const { a, b, c, d } = set.matrices
  const missing = (['a', 'b', 'c', 'd'] as const).filter(key => set.matrices[key] === undefined)
  if (!a || !b || !c || !d) {
    const zeros = missing.includes('d') ? ' A D without numbers of its own is written as zeros.' : ''
    return [{ line: set.line, message: `${name} has no ${missing.map(key => key.toUpperCase()).join(', no ')}.${zeros}` }]
  }
  const states = widthOf(a)
  const inputs = widthOf(b)
  const outputs = c.rows.length
  const sizes = [
    ...sizeProblems(states, 'state', matrixLimits.states, a.line),
    ...sizeProblems(inputs, 'input', matrixLimits.channels, b.line),
    ...sizeProblems(outputs, 'output', matrixLimits.channels, c.line),
  ]
  if (sizes.length > 0) return sizes
  const problems = [
    ...shapeProblems('a', a, states, states), ...shapeProblems('b', b, states, inputs),
    ...shapeProblems('c', c, outputs, states), ...shapeProblems('d', d, outputs, inputs),
    ...nameProblems(set.inputs, 'inputs', inputs), ...nameProblems(set.outputs, 'outputs', outputs),
  ]
  if (problems.length > 0) return problems
  const rowsOf = (matrix: TypedMatrix) => matrix.rows.map(row => row.values)
  return {
    name, a: rowsOf(a), b: rowsOf(b), c: rowsOf(c), d: rowsOf(d), inputs: set.inputs?.names ?? [], outputs: set.outputs?.names ?? [],
    ...(set.sampleTime !== undefined && { sampleTime: set.sampleTime }),
  }
}

/** The commonest number of numbers in a row, so that one short row is the fault and not all others. */
function widthOf({ rows }: TypedMatrix): number {
  const counts = new Map<number, number>()
  for (const { values } of rows) counts.set(values.length, (counts.get(values.length) ?? 0) + 1)
  return [...counts].reduce((best, entry) => entry[1] > best[1] ? entry : best, [0, 0])[0]
}

function sizeProblems(count: number, noun: string, most: number, line: number): MeasurementProblem[] {
  if (count === 0) return [{ line, message: `There is no ${noun}: at least one is needed.` }]
  return count > most ? [{ line, message: `There are ${count} ${noun}s; at most ${most} are taken.` }] : []
}

function shapeProblems(key: MatrixName, { line, rows }: TypedMatrix, height: number, width: number): MeasurementProblem[] {
  const name = key.toUpperCase()
  const problems = rows.flatMap((row, index): MeasurementProblem[] => row.values.length === width
    ? []
    : [{ line: row.line, message: `row ${index + 1} of ${name} has ${counted(row.values.length)}, ${width} ${width === 1 ? 'is' : 'are'} needed` }])
  if (rows.length !== height) problems.push({ line, message: `${name} has ${rows.length} ${rows.length === 1 ? 'row' : 'rows'}, ${height} ${height === 1 ? 'is' : 'are'} needed` })
  return problems
}

const counted = (count: number) => `${count} ${count === 1 ? 'number' : 'numbers'}`

function nameProblems(typed: TypedNames | null, noun: 'inputs' | 'outputs', count: number): MeasurementProblem[] {
  if (typed === null) return []
  const { line, names } = typed
  if (names.length !== count) return [{ line, message: `${names.length} ${noun} are named, the matrices have ${count}` }]
  return names.flatMap((name, index): MeasurementProblem[] => {
    if (!channelName.test(name)) return [{ line, message: `"${name.slice(0, 40)}" is no name for expressions: a letter, then letters, digits and underscores` }]
    return names.indexOf(name) < index ? [{ line, message: `two ${noun} are named ${name}` }] : []
  })
}
