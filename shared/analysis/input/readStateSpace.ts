import type { StateSpaceGain } from '../../types/block'
import { AnalysisInputError } from '../AnalysisInputError'
import { inputLimits } from './inputLimits'
import { readChannelNames } from './readChannelNames'
import { readList } from './readList'
import { readNumber } from './readNumber'
import { readTiming } from './readTiming'

/**
 * Matrices of a state space: A n by n, B n by inputs, C outputs by n, D outputs by inputs.
 *
 * @throws AnalysisInputError with the path in the block and what is wrong with which row, as in 'a[3] has 5 numbers, 6 are needed'
 */
export function readStateSpace(record: Record<string, unknown>): StateSpaceGain {
  const a = readMatrix(record.a, 'a', inputLimits.states)
  const states = a.length
  const b = readMatrix(record.b, 'b', inputLimits.states)
  const c = readMatrix(record.c, 'c', inputLimits.channels)
  const d = readMatrix(record.d, 'd', inputLimits.channels)
  const inputs = b[0]?.length ?? 0
  checkShape(a, 'a', states, states, 'A is square')
  checkShape(b, 'b', states, inputs, 'B has a row for each state, a column for each input')
  checkShape(c, 'c', c.length, states, 'C has a column for each state')
  checkShape(d, 'd', c.length, inputs, 'D has a row for each output, a column for each input')
  if (inputs < 1 || inputs > inputLimits.channels) throw new AnalysisInputError(`b has ${inputs} columns: 1 to ${inputLimits.channels} inputs are read.`, 'b')
  const { sampleTime } = readTiming({ sampleTime: record.sampleTime })
  return {
    kind: 'stateSpace', a, b, c, d,
    inputs: readChannelNames(record.inputs, 'inputs', inputs), outputs: readChannelNames(record.outputs, 'outputs', c.length),
    ...sampleTime !== undefined && { sampleTime },
  }
}

function readMatrix(value: unknown, path: string, most: number): number[][] {
  return readList(value, path, 'rows of numbers', 1, most).map((row, index) =>
    readList(row, `${path}[${index}]`, 'numbers', 1, inputLimits.states).map((entry, column) => readNumber(entry, `${path}[${index}][${column}]`)))
}

function checkShape(matrix: number[][], path: string, rows: number, columns: number, rule: string): void {
  if (matrix.length !== rows) throw new AnalysisInputError(`${path} has ${matrix.length} rows, ${rows} are needed: ${rule}.`, path)
  const wrong = matrix.findIndex(row => row.length !== columns)
  if (wrong >= 0) throw new AnalysisInputError(`${path}[${wrong}] has ${matrix[wrong]!.length} ${matrix[wrong]!.length === 1 ? 'number' : 'numbers'}, ${columns} ${columns === 1 ? 'is' : 'are'} needed: ${rule}.`, `${path}[${wrong}]`)
}
