import { describe, expect, it } from 'vitest'
import { readMatrices } from '#shared/importers/readMatrices'

/** A mass on a spring: 2 states, 1 input, 2 outputs; numbers made up. */
const headed = ['A', '0,1', '-4,-0.1', 'B', '0', '1', 'C', '1,0', '0,1', 'D', '0', '0'].join('\n')
const oneSet = { a: [[0, 1], [-4, -0.1]], b: [[0], [1]], c: [[1, 0], [0, 1]], d: [[0], [0]] }
const problemsOf = (text: string, states: number | null = null) => readMatrices(text, { states }).problems

describe('a file of matrices that cannot be read', () => {
  it.each([
    ['nothing in it', '  \n\n', 0, 'The file is empty.'],
    ['a zero byte', 'A\n1\0', 0, 'This is no text file'],
    ['numbers without headings and no word of the states', '0,1,0\n', 1, 'say how many states it has'],
    ['words', 'A\n0,1\nfoo bar,2\n', 3, '"foo bar" is neither a number'],
    ['numbers before the first heading', '0,1\nA\n0\nB\n1\nC\n1\nD\n0', 1, 'these numbers stand below no heading'],
    ['a quotation mark that never ends', 'A\n"0,1\n-4,-0.1\nB\n', 2, 'A quotation mark'],
    ['a condition without a name', 'condition,\nA\n0\nB\n1\nC\n1\nD\n0', 1, 'needs a name'],
    ['a sample time of nothing', `sample time, 0\n${headed}`, 1, 'over 0'],
    ['B twice', 'A\n0\nB\n1\nB\n1\nC\n1\nD\n0', 5, 'B stands twice'],
    ['broken JSON', '{"A": [[1]],\n "B": [[1]],\n "C": [[1]] "D"', 3, 'The file is not JSON'],
    ['JSON of something else', '[]', 0, 'holds no matrices'],
    ['a text among the numbers', '{"A": [["0"]], "B": [[1]], "C": [[1]], "D": [[0]]}', 0, 'row 1 of A: column 1 is no number'],
    ['a field nobody knows', '{"A": [[0]], "E": [[1]]}', 0, 'there is no field "E"'],
    ['a condition twice in JSON, of which a parser keeps the last', '{"C1": {"A": 1, "B": 1, "C": 1, "D": 0},\n "C1": {"A": 2, "B": 1, "C": 1, "D": 0}}', 2, '"C1" stands twice'],
    ['the same key written two ways', '{"A": 1, "B": 1, "C": 1, "D": 0, "\\u0041": 2}', 1, '"A" stands twice'],
    ['a set under a blank name, which nobody could choose', '{" ": {"A": 1, "B": 1, "C": 1, "D": 0}, "C1": {"A": 1, "B": 1, "C": 1, "D": 0}}', 0, 'not blank'],
    ['more sets than are read, of which none is looked at', JSON.stringify(Array.from({ length: 1001 }, () => 0)), 0, 'The file holds 1001 sets of matrices'],
    ['more lines than all sets could fill', '1\n'.repeat(300_001), 0, 'at most 300000 are read'],
  ])('holds %s, and says so with the line', (_, text, line, message) => {
    expect(problemsOf(text)[0]?.line).toBe(line)
    expect(problemsOf(text)[0]?.message).toContain(message)
    expect(readMatrices(text).sets).toEqual([])
  })

  it('names the row of the matrix and its line where a number is missing', () => {
    const text = headed.replace('-4,-0.1', '-4')
    expect(problemsOf(text)).toContainEqual({ line: 3, message: 'row 2 of A has 1 number, 2 are needed' })
    const six = ['A', ...Array.from({ length: 6 }, (_, row) => row === 2 ? '1,2,3,4,5' : '1,2,3,4,5,6'), 'B', ...Array.from({ length: 6 }, () => '1'), 'C', '1,0,0,0,0,0', 'D', '0'].join('\n')
    expect(problemsOf(six)).toEqual([{ line: 4, message: 'row 3 of A has 5 numbers, 6 are needed' }])
  })

  it('says how many rows are there and how many are needed', () => {
    expect(problemsOf(headed.replace('B\n0\n1', 'B\n0'))).toEqual([{ line: 4, message: 'B has 1 row, 2 are needed' }])
    expect(problemsOf(headed.replace('D\n0\n0', 'D\n0'))).toEqual([{ line: 10, message: 'D has 1 row, 2 are needed' }])
  })

  it('says which matrix is missing; D too, since zeros are not guessed', () => {
    expect(problemsOf(headed.replace('D\n0\n0', ''))[0]?.message).toBe('set 1 has no D. A D without numbers of its own is written as zeros.')
  })

  it('names the column of what is no number', () => {
    expect(problemsOf(headed.replace('-4,-0.1', '-4,-0.1.2'))[0]).toEqual({ line: 3, message: 'row 2 of A: column 2 "-0.1.2" is no number' })
    expect(problemsOf(headed.replace('0,1\n-4', ',1\n-4'))[0]).toEqual({ line: 2, message: 'row 1 of A: column 1 is empty' })
  })

  it('has channels whose names no expression could take, too few of them, or one twice', () => {
    expect(problemsOf(`outputs, rate, tip angle [deg]\n${headed}`)[0]?.line).toBe(1)
    expect(problemsOf(`outputs, rate\n${headed}`)).toEqual([{ line: 1, message: '1 outputs are named, the matrices have 2' }])
    expect(problemsOf(`outputs, rate, rate\n${headed}`)).toEqual([{ line: 1, message: 'two outputs are named rate' }])
  })

  it('names two conditions alike', () => {
    expect(problemsOf(`condition, C1\n${headed}\ncondition, C1\n${headed}`)).toEqual([{ line: 14, message: 'there are two sets named C1' }])
  })

  it('holds more states or channels than the engine takes', () => {
    const wide = Array.from({ length: 201 }, () => Array.from({ length: 201 }, () => 0))
    expect(problemsOf(JSON.stringify({ A: wide, B: wide.map(() => [1]), C: [wide[0]], D: 0 }))[0]?.message).toBe('There are 201 states; at most 200 are taken.')
  })

  it('names two conditions of plain numbers alike: the second is not taken for outputs of the first', () => {
    const plain = '-1,1\n1,0'
    expect(problemsOf(`condition, C1\n${plain}\ncondition, C1\n${plain.replace('-1', '-2')}`, 1)).toEqual([{ line: 5, message: 'there are two sets named C1' }])
  })

  it('is told though more rows are at fault than a function takes arguments', () => {
    const text = `A\n${'1\n1,1\n1\n'.repeat(90_000)}B\n1\nC\n1\nD\n0`
    expect(problemsOf(text)).toHaveLength(101)
  })

  it('tells a hundred faults and counts the rest', () => {
    const text = `A\n${Array.from({ length: 150 }, () => '1,x').join('\n')}`
    expect(problemsOf(text)).toHaveLength(101)
    expect(problemsOf(text).at(-1)?.message).toBe('and 50 more faults')
  })
})

describe('a file of matrices', () => {
  it.each([
    ['with commas', headed],
    ['with a byte order mark, Windows line ends, comments and blank lines', `\uFEFF% of the bench\r\n\r\n${headed.replaceAll('\n', '\r\n')}\r\n`],
    ['with semicolons and decimal commas', headed.replaceAll(',', ';').replaceAll('.', ',')],
    ['with tabulators', headed.replaceAll(',', '\t')],
    ['with blanks in columns', headed.replaceAll(',', '   ').replaceAll('\n', '\n  ')],
    ['filled up with empty cells by a spreadsheet', headed.split('\n').map(line => `${line},,`).join('\n')],
    ['with small letters and equals signs', headed.replace('A', 'a =').replace('B', 'b:').replace('C', 'c').replace('D', 'd')],
    ['as JSON', JSON.stringify({ A: oneSet.a, b: oneSet.b, C: oneSet.c, d: oneSet.d })],
  ])('is read %s', (_, text) => {
    expect(readMatrices(text)).toEqual({ sets: [{ name: 'set 1', ...oneSet, inputs: [], outputs: [] }], problems: [] })
  })

  it('names its channels and its sample time, for all sets or for one', () => {
    const { sets } = readMatrices(`inputs, torque\nsample time, 0.001\ncondition, C1\n${headed}\ncondition, C2 deep\noutputs, rate, angle\nsample time, 0.002\n${headed}`)
    expect(sets.map(({ name, inputs, outputs, sampleTime }) => ({ name, inputs, outputs, sampleTime }))).toEqual([
      { name: 'C1', inputs: ['torque'], outputs: [], sampleTime: 0.001 },
      { name: 'C2 deep', inputs: ['torque'], outputs: ['rate', 'angle'], sampleTime: 0.002 },
    ])
  })

  it('begins the next set with a second A, and counts sets without names', () => {
    expect(readMatrices(`${headed}\n${headed}`).sets.map(set => set.name)).toEqual(['set 1', 'set 2'])
  })

  it('holds, as JSON, a record of sets by condition or a list', () => {
    const set = { A: oneSet.a, B: oneSet.b, C: oneSet.c, D: oneSet.d, outputs: ['rate', 'angle'], sampleTime: 0.01 }
    expect(readMatrices(JSON.stringify({ C1: set, C2: set })).sets.map(({ name, outputs, sampleTime }) => [name, outputs, sampleTime])).toEqual([['C1', ['rate', 'angle'], 0.01], ['C2', ['rate', 'angle'], 0.01]])
    expect(readMatrices(JSON.stringify([set, { ...set, name: 'deep' }])).sets.map(({ name }) => name)).toEqual(['set 1', 'deep'])
    expect(readMatrices(JSON.stringify({ ' C1 ': set })).sets.map(({ name }) => name)).toEqual(['C1'])
    expect(problemsOf(JSON.stringify({ C1: set, C2: { ...set, B: [[1]] } }))).toEqual([{ line: 0, message: 'C2: B has 1 row, 2 are needed' }])
  })
})

describe('plain numbers [A B; C D] with the states told', () => {
  const plain = ['0,1,0', '-4,-0.1,1', '1,0,0', '0,1,0'].join('\n')
  const wanted = { ...oneSet, inputs: [], outputs: [] }

  it('are one set', () => {
    expect(readMatrices(plain, { states: 2 }).sets).toEqual([{ name: 'set 1', ...wanted }])
  })

  it('may have a blank line between [A B] and [C D], and a comment anywhere', () => {
    expect(readMatrices('0,1,0\n% the spring\n-4,-0.1,1\n\n1,0,0\n0,1,0', { states: 2 }).sets).toEqual([{ name: 'set 1', ...wanted }])
  })

  it('are several sets with condition lines, blank lines, or the number of outputs to part them', () => {
    expect(readMatrices(`condition, C1\n${plain}\ncondition, C2\n${plain}`, { states: 2 }).sets.map(set => set.name)).toEqual(['C1', 'C2'])
    expect(readMatrices(`${plain}\n\n${plain}\n,,\n${plain}`, { states: 2 }).sets).toHaveLength(3)
    expect(readMatrices(`${plain}\n${plain}`, { states: 2, outputs: 2 }).sets).toEqual([{ name: 'set 1', ...wanted }, { name: 'set 2', ...wanted }])
  })

  it('are refused where width or height do not fit, with the line', () => {
    expect(problemsOf(plain.replace('1,0,0', '1,0'), 2)).toEqual([{ line: 3, message: 'this row has 2 numbers, the others have 3' }])
    expect(problemsOf(plain, 3)[0]).toEqual({ line: 1, message: 'the rows have 3 numbers: with 3 states [A B] needs 3 and one for each input' })
    expect(problemsOf(plain, 4)[0]?.line).toBe(1)
    expect(problemsOf('0,1,0\n-4,-0.1,1', 2)).toEqual([{ line: 1, message: 'the set that begins here has 2 rows: with 2 states [A B; C D] needs 2 and one for each output' }])
    expect(problemsOf(`${plain}\n\n${plain}\n1,1,1`, 2)).toEqual([{ line: 6, message: 'the set that begins here has 5 rows, the first has 4' }])
    expect(readMatrices(`${plain}\n${plain}`, { states: 2, outputs: 1 }).problems[0]?.message).toBe('there are 8 rows: with 2 states and 1 output they must be a multiple of 3')
  })
})
