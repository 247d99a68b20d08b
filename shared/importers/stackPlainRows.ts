import { matrixLimits } from './matrixLimits'
import type { TypedSet } from './MatrixSet'
import type { MeasurementProblem } from './MeasurementProblem'
import type { PlainShape } from './readMatrices'

export interface PlainRow {
  line: number
  values: number[]
  /** the 'condition' line above it, which begins and names its set; null where there is none */
  set: { name: string, line: number } | null
  /** whether a blank line stands between it and the row before */
  afterBlank: boolean
}

type Stacked = { sets: TypedSet[] } | { problems: MeasurementProblem[] }

/**
 * Rows of plain numbers as sets [A B; C D] with `shape.states` states. One set ends at a 'condition' line; without those, where `shape.outputs` says,
 * or else at a blank line (one between [A B] and [C D] parts nothing). Width and height must fit, or every fault is told with its line.
 */
export function stackPlainRows(rows: readonly PlainRow[], shape: PlainShape): Stacked {
  const [first] = rows
  if (first === undefined) return { problems: [{ line: 0, message: 'The file holds no numbers.' }] }
  const { states } = shape
  if (states === null) {
    return { problems: [{ line: first.line, message: 'The file has no headings A, B, C, D: say how many states it has to have it read as [A B; C D], or add the headings.' }] }
  }
  if (states > matrixLimits.states) return { problems: [{ line: 0, message: `There are ${states} states; at most ${matrixLimits.states} are taken.` }] }
  const width = commonest(rows.map(row => row.values.length))
  const uneven = rows.filter(row => row.values.length !== width)
  if (uneven.length > 0) return { problems: uneven.map(({ line, values }) => ({ line, message: `this row has ${values.length} numbers, the others have ${width}` })) }
  if (width <= states) return { problems: [{ line: first.line, message: `the rows have ${width} numbers: with ${states} states [A B] needs ${states} and one for each input` }] }
  const groups = groupsOf(rows, states, shape.outputs ?? null)
  if ('problems' in groups) return groups
  return setsOf(groups, states)
}

function commonest(counts: readonly number[]): number {
  const found = new Map<number, number>()
  for (const count of counts) found.set(count, (found.get(count) ?? 0) + 1)
  return [...found].reduce((best, entry) => entry[1] > best[1] ? entry : best, [0, 0])[0]
}

function groupsOf(rows: readonly PlainRow[], states: number, outputs: number | null): PlainRow[][] | { problems: MeasurementProblem[] } {
  if (rows.some(row => row.set !== null)) return partsOf(rows, (row, before) => row.set !== before.set)
  if (outputs !== null) {
    const height = states + outputs
    if (rows.length % height !== 0) return { problems: [{ line: rows[0]?.line ?? 0, message: `there are ${rows.length} rows: with ${states} states and ${outputs} ${outputs === 1 ? 'output' : 'outputs'} they must be a multiple of ${height}` }] }
    return Array.from({ length: rows.length / height }, (_, index) => rows.slice(index * height, (index + 1) * height))
  }
  const parts = partsOf(rows, row => row.afterBlank)
  const groups: PlainRow[][] = []
  for (let index = 0; index < parts.length; index++) {
    const part = parts[index] ?? []
    // A part of just as many rows as states is [A B], and [C D] follows it.
    if (part.length === states && index + 1 < parts.length) groups.push([...part, ...parts[++index] ?? []])
    else groups.push(part)
  }
  return groups
}

function partsOf(rows: readonly PlainRow[], parts: (row: PlainRow, before: PlainRow) => boolean): PlainRow[][] {
  const found: PlainRow[][] = []
  for (const [index, row] of rows.entries()) {
    const before = rows[index - 1]
    if (before === undefined || parts(row, before)) found.push([])
    found.at(-1)?.push(row)
  }
  return found
}

function setsOf(groups: readonly PlainRow[][], states: number): Stacked {
  const height = groups[0]?.length ?? 0
  const problems = groups.flatMap((group): MeasurementProblem[] => {
    const line = group[0]?.line ?? 0
    if (group.length <= states) return [{ line, message: `the set that begins here has ${group.length} rows: with ${states} states [A B; C D] needs ${states} and one for each output` }]
    return group.length === height ? [] : [{ line, message: `the set that begins here has ${group.length} rows, the first has ${height}` }]
  })
  if (problems.length > 0) return { problems }
  const block = (group: PlainRow[], fromRow: number, toRow: number, from: number, to?: number) => ({
    line: group[fromRow]?.line ?? 0,
    rows: group.slice(fromRow, toRow).map(({ line, values }) => ({ line, values: values.slice(from, to) })),
  })
  return {
    sets: groups.map(group => ({
      name: group[0]?.set?.name ?? null,
      line: group[0]?.line ?? 0,
      matrices: { a: block(group, 0, states, 0, states), b: block(group, 0, states, states), c: block(group, states, group.length, 0, states), d: block(group, states, group.length, states) },
      inputs: null,
      outputs: null,
    })),
  }
}
