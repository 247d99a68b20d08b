import { describe, expect, it } from 'vitest'
import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'
import { readLoopInput } from '#shared/analysis/readLoopInput'

/** What the reader says of a faulty entry; fails when it says nothing. */
function refusalOf(value: unknown): AnalysisInputError {
  try {
    readLoopInput(value)
  }
  catch (error) {
    if (error instanceof AnalysisInputError) return error
    throw error
  }
  throw new Error('the entry was accepted')
}

const coefficients = { numerator: [3], denominator: [1, 3, 3, 1] }
const roots = { zeros: [], poles: [[-1, 2], [-1, -2]], gain: 4 }
const points = [{ frequency: 1, re: 1, im: -2 }, { frequency: 2, re: 0.5, im: -1 }, { frequency: 3, re: 0, im: -0.1 }]
const measured = (change: object) => ({ measured: { quantity: 'loopGain', points, ...change } })
const withPoint = (index: number, change: object) => measured({ points: points.map((point, at) => at === index ? { ...point, ...change } : point) })

describe('readLoopInput refuses, naming the field', () => {
  it.each<[string, unknown, string, RegExp]>([
    ['text in place of an entry', 'L', '', /object with named fields/],
    ['a list in place of an entry', [coefficients], '', /not a list/],
    ['nothing', null, '', /not nothing/],
    ['an entry without source', { name: 'slew' }, '', /no source/],
    ['two source forms at once', { ...coefficients, ...roots }, 'zeros', /both as coefficients and as zeros/],
    ['an expression beside coefficients', { ...coefficients, expression: '1/s' }, 'expression', /leave one of them out/],
    ['a numerator alone', { numerator: [1] }, 'denominator', /denominator is missing/],
    ['zeros and poles without gain', { zeros: [], poles: [] }, 'gain', /gain is missing/],
    ['a dead time beside an expression', { expression: '1/s', deadTime: 1 }, 'deadTime', /exp\(-s\*T\)/],
    ['a dead time beside a measured response', { ...measured({}), deadTime: 1 }, 'deadTime', /already in/],
    ['parameters beside coefficients', { ...coefficients, parameters: { k: 1 } }, 'parameters', /does not go with/],
    ['a pole count beside coefficients', { ...coefficients, openLoopUnstablePoles: 1 }, 'openLoopUnstablePoles', /does not go with/],
    ['a field written in another way', { ...coefficients, dead_time: 1 }, 'dead_time', /write deadTime/],
    ['a field under another name', { ...coefficients, Ts: 0.1 }, 'Ts', /write sampleTime/],

    ['an empty denominator', { numerator: [1], denominator: [] }, 'denominator', /is empty/],
    ['a zero denominator', { numerator: [1], denominator: [0, 0, -0] }, 'denominator', /is zero/],
    ['an empty numerator', { numerator: [], denominator: [1] }, 'numerator', /is empty/],
    ['NaN in a denominator', { numerator: [1], denominator: [1, 2, Number.NaN] }, 'denominator[2]', /finite number, not NaN/],
    ['infinity in a numerator', { numerator: [Infinity], denominator: [1, 2] }, 'numerator[0]', /not Infinity/],
    ['a coefficient as text', { numerator: ['1'], denominator: [1, 2] }, 'numerator[0]', /not "1"/],
    ['a lost number in a list', { numerator: [1], denominator: [1, null] }, 'denominator[1]', /not nothing/],
    ['a number in place of a list', { numerator: 1, denominator: [1, 2] }, 'numerator', /list of coefficients/],
    ['degree 201', { numerator: [1], denominator: new Array(202).fill(1) }, 'denominator', /at most 201/],
    ['a loop improper in s with dead time', { numerator: [1, 0, 0], denominator: [1, 1], deadTime: 0.1 }, 'numerator', /improper.*degree 2.*degree 1/],
    ['the same behind leading zeros', { numerator: [1, 0], denominator: [0, 0, 4], deadTime: 0.1 }, 'numerator', /degree 1.*degree 0/],
    ['a negative dead time', { ...coefficients, deadTime: -1e-9 }, 'deadTime', /0 or more/],
    ['a dead time that is NaN', { ...coefficients, deadTime: Number.NaN }, 'deadTime', /finite/],
    ['a sample time of 0', { ...coefficients, sampleTime: 0 }, 'sampleTime', /above 0/],
    ['a negative sample time', { ...coefficients, sampleTime: -0.1 }, 'sampleTime', /above 0/],

    ['an unpaired complex pole', { ...roots, poles: [[-1, 2]] }, 'poles[0]', /\[-1, -2\] must be in the list too/],
    ['an unpaired root below the axis', { ...roots, poles: [[-1, 0], [-1, -2]] }, 'poles[1]', /no conjugate/],
    ['a pair that differs by 1e-8', { ...roots, poles: [[-1, 2], [-1.00000002, -2]] }, 'poles[0]', /no conjugate/],
    ['one partner for two roots', { ...roots, poles: [[-1, 2], [-1, 2], [-1, -2]] }, 'poles[1]', /no conjugate/],
    ['a root as a plain number', { ...roots, zeros: [-3] }, 'zeros[0]', /written \[re, im\]/],
    ['a root of three numbers', { ...roots, zeros: [[-3, 0, 0]] }, 'zeros[0]', /written \[re, im\]/],
    ['a root that is NaN', { ...roots, zeros: [[-3, Number.NaN]] }, 'zeros[0][1]', /finite/],
    ['201 poles', { ...roots, poles: Array.from({ length: 201 }, () => [-1, 0]) }, 'poles', /at most 200/],
    ['an infinite gain', { ...roots, gain: -Infinity }, 'gain', /finite/],
    ['more zeros than poles with dead time', { zeros: [[-1, 0]], poles: [], gain: 1, deadTime: 1 }, 'zeros', /improper/],

    ['an expression of 10,000 characters', { expression: 's+'.repeat(5000) }, 'expression', /10000 characters/],
    ['an empty expression', { expression: ' \n' }, 'expression', /empty/],
    ['an expression that is a number', { expression: 1 }, 'expression', /must be text/],
    ['a parameter that is text', { expression: 'k/s', parameters: { k: '4' } }, 'parameters.k', /finite/],
    ['a parameter named s', { expression: 'k/s', parameters: { s: 4 } }, 'parameters.s', /own meaning/],
    ['a parameter with a blank in its name', { expression: 'k/s', parameters: { 'k 1': 4 } }, 'parameters.k 1', /cannot name/],
    ['parameters in a list', { expression: 'k/s', parameters: [4] }, 'parameters', /named fields/],

    ['an unknown unit of frequency', { ...coefficients, frequencyUnit: 'kHz' }, 'frequencyUnit', /"rad\/s" or "Hz"/],
    ['a gain floor above 0 dB', { ...coefficients, gainFloor: 0.1 }, 'gainFloor', /0 or less/],
    ['a band that does not rise', { ...coefficients, band: [2, 2] }, 'band[1]', /must rise/],
    ['a band that falls', { ...coefficients, band: [3, 2] }, 'band[1]', /must rise/],
    ['a band from a negative frequency', { ...coefficients, band: [-1, 2] }, 'band[0]', /not negative/],
    ['a band of one frequency', { ...coefficients, band: [1] }, 'band', /two frequencies/],
    ['a band to infinity', { ...coefficients, band: [1, Infinity] }, 'band[1]', /finite/],
    ['a band above half the sampling frequency', { ...coefficients, sampleTime: 0.1, frequencyUnit: 'Hz', band: [5, 6] }, 'band[0]', /ends at .* 5\./],
    ['a name that is no text', { ...coefficients, name: 7 }, 'name', /must be text/],

    ['a single sample', measured({ points: points.slice(0, 1) }), 'measured.points', /a single point/],
    ['no sample', measured({ points: [] }), 'measured.points', /no point/],
    ['an unknown quantity', measured({ quantity: 'loop gain' }), 'measured.quantity', /one of loopGain/],
    ['no quantity', { measured: { points } }, 'measured.quantity', /not nothing/],
    ['a negative frequency', withPoint(0, { frequency: -1 }), 'measured.points[0].frequency', /not negative/],
    ['unsorted frequencies', withPoint(1, { frequency: 5 }), 'measured.points[2].frequency', /below the point before/],
    ['a repeated frequency', withPoint(1, { frequency: 1 }), 'measured.points[1].frequency', /repeats/],
    ['a sample without imaginary part', withPoint(1, { im: undefined }), 'measured.points[1].im', /finite/],
    ['an infinite sample', withPoint(1, { re: Infinity }), 'measured.points[1].re', /finite/],
    ['coherence above 1', withPoint(2, { coherence: 1.0001 }), 'measured.points[2].coherence', /between 0 and 1/],
    ['negative coherence', withPoint(2, { coherence: -0.1 }), 'measured.points[2].coherence', /between 0 and 1/],
    ['coherence that is NaN', withPoint(2, { coherence: Number.NaN }), 'measured.points[2].coherence', /finite/],
    ['no averages', measured({ averages: 0 }), 'measured.averages', /whole number from 1/],
    ['half an average', measured({ averages: 2.5 }), 'measured.averages', /whole number/],
    ['stayedStable as text', measured({ stayedStable: 'yes' }), 'measured.stayedStable', /true or false/],
    ['a negative count of poles', { ...measured({}), openLoopUnstablePoles: -1 }, 'openLoopUnstablePoles', /whole number from 0/],
    ['200,001 samples', measured({ points: Array.from({ length: 200_001 }, (_, index) => ({ frequency: index + 1, re: 1, im: 0 })) }), 'measured.points', /at most 200000/],
  ])('%s', (_, value, path, message) => {
    const refusal = refusalOf(value)
    expect(refusal.path).toBe(path)
    expect(refusal.message).toMatch(message)
    expect(refusal.message.length).toBeLessThan(400)
  })
})

describe('readLoopInput passes on', () => {
  it('each form with its numbers untouched', () => {
    const entries = [
      { name: 'slew', frequencyUnit: 'Hz', gainFloor: -40, band: [0, 10], ...coefficients, deadTime: 0.01 },
      { ...roots, sampleTime: 0.001 },
      { expression: 'k/s', parameters: { k: 2 } },
      { ...measured({ averages: 8, stayedStable: true }), openLoopUnstablePoles: 0, openLoopOriginPoles: 1 },
    ]
    expect(entries.map(readLoopInput)).toEqual(entries)
  })

  it('an improper loop in z with dead time: its axis ends at half the sampling frequency', () => {
    expect(readLoopInput({ numerator: [1, 0, 0], denominator: [1, 1], deadTime: 0.1, sampleTime: 0.1 })).toHaveProperty('numerator')
  })

  it('pairs that differ in the last digits written, in any order', () => {
    expect(readLoopInput({ zeros: [], poles: [[-0.0097642233, -0.7136363764], [0, 0], [-0.0097642234, 0.7136363764]], gain: 1 })).toHaveProperty('poles')
  })

  it('null as a field left out', () => {
    expect(readLoopInput({ ...coefficients, deadTime: 0, sampleTime: null, band: null })).toEqual({ ...coefficients, deadTime: 0 })
  })

  it('an expression beside a dead time of 0, which is none', () => {
    expect(readLoopInput({ expression: '1/s', deadTime: 0 })).toEqual({ expression: '1/s' })
  })

  it('nothing that the contract does not know', () => {
    expect(readLoopInput({ ...coefficients, id: 'a7', note: 'kept elsewhere' })).toEqual(coefficients)
  })

  it('not the list it was given, so that later changes do not reach the analysis', () => {
    const entry = { numerator: [3], denominator: [1, 1] }
    const input = readLoopInput(entry)
    entry.numerator[0] = 99
    expect(input).toHaveProperty('numerator', [3])
  })
})
