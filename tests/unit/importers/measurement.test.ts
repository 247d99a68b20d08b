import { describe, expect, it } from 'vitest'
import { parseDecimal } from '#shared/importers/parseDecimal'
import { previewMeasurement } from '#shared/importers/previewMeasurement'
import { readMeasurement } from '#shared/importers/readMeasurement'
import type { MeasurementMapping } from '#shared/types/source'

const mapping: MeasurementMapping = {
  frequencyColumn: 0, frequencyUnit: 'Hz', form: 'dB and degrees', firstColumn: 1, secondColumn: 2, coherenceColumn: null, quantity: 'loopGain',
}
const withCoherence: MeasurementMapping = { ...mapping, coherenceColumn: 3 }
const problemsOf = (text: string, change: Partial<MeasurementMapping> = {}) => readMeasurement(text, { ...mapping, ...change }).problems

describe('parseDecimal', () => {
  it('takes plain decimals only', () => {
    expect(['1', '-1.5e-3', '+.5', ' 2. ', '', ' ', 'NaN', '1e999', '1,5', '1.5 dB', '0x10', '1e', 'Infinity', '--1'].map(cell => parseDecimal(cell, false)))
      .toEqual([1, -0.0015, 0.5, 2, null, null, null, null, null, null, null, null, null, null])
  })

  it('takes a decimal comma where the file has one, and no thousands separators', () => {
    expect(['1,5', '-0,25e2', '1.5', '1.000,5', '1,000,5'].map(cell => parseDecimal(cell, true))).toEqual([1.5, -25, null, null, null])
  })
})

describe('readMeasurement tells what is wrong by line number and stores nothing', () => {
  it.each([
    ['an empty file', '', 0, /empty/],
    ['a file of comments', '# a\n# b', 0, /empty/],
    ['a file without numbers', 'a,b,c\nd,e,f', 0, /three numbers/],
    ['two columns', '1,2\n3,4', 0, /three numbers/],
    ['a file that is no text', 'PK\0\0', 0, /no text file/],
    ['a single row', 'f,dB,deg\n1,2,3\n', 0, /single row/],
    ['text in a row', 'f,dB,deg\n1,0,-90\n2,over,-100\n3,-6,-120', 3, /gain in dB "over" is no number \(column 2\)/],
    ['a bad row above the first good one', 'f,dB,deg\n1,over,-90\n2,0,-100\n3,-6,-120', 2, /gain in dB "over" is no number/],
    ['a missing cell', 'f,dB,deg\n1,0,-90\n2,-3\n3,-6,-120', 3, /phase is missing \(column 3\)/],
    ['a footer', 'f,dB,deg\n1,0,-90\n2,-3,-100\nend of file', 4, /"end of file" is no number/],
    ['a negative frequency', '-1,0,-90\n2,-3,-100', 1, /negative/],
    ['a repeated frequency', '1,0,-90\n2,-3,-100\n\n2,-3,-100', 4, /repeats that of line 2/],
    ['an unsorted frequency', '1,0,-90\n3,-3,-100\n2,-3,-100', 3, /below that of line 2 \(3\)/],
    ['a quotation mark that never ends, in a column of remarks', 'f,dB,deg,remark\n1,0,-90,\n2,-3,-100,"ok\n3,-6,-120,\n4,-9,-130,', 3, /quotation mark .* end of the file/],
    ['a gain too large for a number', '1,0,-90\n2,99999,-100', 2, /out of range/],
  ])('%s', (_, text, line, message) => {
    const reading = readMeasurement(text, mapping)
    expect(reading.points).toEqual([])
    expect(reading.problems[0]).toMatchObject({ line, message: expect.stringMatching(message) })
  })

  it('a coherence outside 0 to 1', () => {
    expect(problemsOf('1,0,-90,0.9\n2,-3,-100,1.01', withCoherence)).toEqual([{ line: 2, message: 'The coherence 1.01 is outside 0 to 1.' }])
  })

  it('a negative ratio', () => {
    expect(problemsOf('1,1,-90\n2,-3,-100', { form: 'ratio and degrees' })).toEqual([{ line: 2, message: 'The ratio -3 is negative: is it in dB?' }])
  })

  it('a mapping beyond the columns, or of one column twice', () => {
    expect(problemsOf('1,0,-90\n2,-3,-100', { secondColumn: 7 })[0]?.message).toBe('The mapping names column 8, but the file has 3 columns.')
    expect(problemsOf('1,0,-90\n2,-3,-100', { secondColumn: 1 })[0]?.message).toBe('The mapping names one column twice.')
  })

  it('every bad row, up to a hundred, then how many more', () => {
    const problems = problemsOf(`f,dB,deg\n1,2,3\n${'x,0,0\n'.repeat(150)}`)
    expect([problems[0]?.line, problems[99]?.line, problems[100]?.message]).toEqual([3, 102, 'and 50 more rows'])
  })

  it('more than 200,000 rows', () => {
    const text = Array.from({ length: 200_001 }, (_, index) => `${index + 1},0,0`).join('\n')
    expect(problemsOf(text)[0]).toMatchObject({ line: 200_001, message: expect.stringContaining('at most 200000') })
  })

  it('more than 20 MB', () => {
    expect(problemsOf('1,2,3\n'.repeat(3_500_000))[0]?.message).toContain('20 MB')
  })

  it('the line in the file, past comments, blank lines, a quoted head over two lines and line ends of any kind', () => {
    expect(problemsOf('# made\r\n\r\n"f\n(Hz)",dB,deg\r1,0,0\n2,?,0')[0]?.line).toBe(6)
  })
})

describe('readMeasurement', () => {
  it('turns dB and degrees into the complex ratio', () => {
    const { points, problems } = readMeasurement('f,dB,deg\n1,0,-90\n10,-20,180\n', mapping)
    expect(problems).toEqual([])
    expect(points.map(point => point.frequency)).toEqual([1, 10])
    expect(points[0]!.re).toBeCloseTo(0, 15)
    expect(points[0]!.im).toBe(-1)
    expect(points[1]!.re).toBeCloseTo(-0.1, 15)
  })

  it.each([
    ['ratio and degrees', '2,60'], ['dB and radians', '6.020599913279624,1.0471975511965976'],
    ['ratio and radians', '2,1.0471975511965976'], ['real and imaginary', '1,1.7320508075688772'],
  ] as const)('reads %s', (form, values) => {
    const { points } = readMeasurement(`1,${values}\n2,${values}`, { ...mapping, form })
    expect(points[0]!.re).toBeCloseTo(1, 12)
    expect(points[0]!.im).toBeCloseTo(Math.sqrt(3), 12)
  })

  it.each([
    ['semicolons and decimal commas', 'f;dB;deg\n1,5;0,5;-90,0\n2;-3;-100'],
    ['tabulators', 'f\tdB\tdeg\n1.5\t0.5\t-90.0\n2\t-3\t-100'],
    ['tabulators and decimal commas', '1,5\t0,5\t-90,0\n2\t-3\t-100'],
    ['a byte order mark and quotes', '\uFEFF"f","dB","deg"\r\n"1.5","0.5","-90.0"\r\n"2","-3","-100"\r\n'],
    ['columns left over', 'f,dB,deg,\n1.5,0.5,-90,\n2,-3,-100,'],
    ['falling frequencies', '2,-3,-100\n1.5,0.5,-90'],
  ])('reads %s', (_, text) => {
    const { points, problems } = readMeasurement(text, mapping)
    expect(problems).toEqual([])
    expect(points.map(point => point.frequency)).toEqual([1.5, 2])
    expect(Math.hypot(points[0]!.re, points[0]!.im)).toBeCloseTo(10 ** (0.5 / 20), 12)
  })

  it('carries the coherence', () => {
    expect(readMeasurement('1,0,0,0.9\n2,0,0,1', withCoherence).points.map(point => point.coherence)).toEqual([0.9, 1])
  })
})

describe('previewMeasurement', () => {
  it('shows a file that is no table as a problem of the whole', () => {
    expect(previewMeasurement('hello')).toMatchObject({ columns: [], dialect: null, guess: null, rejectedRows: [{ line: 0 }] })
  })

  it('shows the first rows with their lines, the count, and the rows it rejects', () => {
    const preview = previewMeasurement('# swept sine\nFrequency [Hz],Magnitude [dB],Phase [deg]\n1,0,-90\n2,bad,-91\n3,0,-92\n', 2)
    expect(preview.rows.map(row => row.line)).toEqual([3, 4])
    expect(preview).toMatchObject({ rowCount: 3, comments: ['swept sine'], rejectedRows: [{ line: 4, message: '"bad" in Magnitude [dB] is no number.' }] })
    expect(preview.columns[1]).toEqual({ name: 'Magnitude [dB]', unit: 'dB' })
  })

  it.each<[string, string, Partial<MeasurementMapping>]>([
    ['names with units', 'Frequency (Hz),Gain (dB),Phase (deg),Coherence\n1,0,-90,0.9', { frequencyUnit: 'Hz', form: 'dB and degrees', firstColumn: 1, secondColumn: 2, coherenceColumn: 3 }],
    ['a row of units', 'f;Coh;Mag;Ph.angle\nrad/s;-;1;rad\n1;0,9;2,5;-1,2', { frequencyUnit: 'rad/s', form: 'ratio and radians', firstColumn: 2, secondColumn: 3, coherenceColumn: 1 }],
    ['real and imaginary parts', 'omega,Re,Im\n1,0,-90', { frequencyUnit: 'rad/s', form: 'real and imaginary', firstColumn: 1, secondColumn: 2, coherenceColumn: null }],
    ['another order of columns', 'Real L,Imag L,Freq\n1,0,9', { frequencyColumn: 2, form: 'real and imaginary', firstColumn: 0, secondColumn: 1 }],
    ['a named quantity', '# complementary sensitivity\nf,mag dB,phase\n1,0,-90', { quantity: 'complementarySensitivity', form: 'dB and degrees' }],
    ['the return difference', 'f,real(1+L),imag(1+L)\n1,0,-90', { quantity: 'returnDifference', form: 'real and imaginary' }],
    ['a magnitude without unit that goes below 0', 'f,magnitude,phase\n1,3,-90\n2,-3,-100', { form: 'dB and degrees' }],
    ['no head, polar', '1,20,-90,0.99\n2,-3,-170,0.9', { frequencyColumn: 0, form: 'dB and degrees', coherenceColumn: 3 }],
    ['no head, small numbers', '1,0.5,-0.9\n2,0.2,-0.7', { form: 'real and imaginary', coherenceColumn: null, quantity: 'loopGain' }],
  ])('guesses the mapping from %s', (_, text, guess) => {
    expect(previewMeasurement(text).guess).toMatchObject(guess)
  })

  it('guesses nothing where the head says another unit or too little', () => {
    expect(previewMeasurement('Frequency (kHz),dB,deg\n1,0,-90').guess).toBeNull()
    expect(previewMeasurement('time,voltage,current\n1,0,-90').guess).toBeNull()
  })
})
