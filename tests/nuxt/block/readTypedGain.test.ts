import { describe, expect, it } from 'vitest'
import type { BlockDefinition } from '#shared/types/block'
import { readTypedGain } from '~/services/readTypedGain'
import { emptyGain, typedGain, type TypedGain } from '~/services/TypedGain'

const read = (fields: Partial<TypedGain>) => readTypedGain({ ...emptyGain('Hz'), ...fields })
const problemsOf = (fields: Partial<TypedGain>) => {
  const answer = read(fields)
  return 'problems' in answer ? Object.fromEntries(answer.problems.map(({ path, message }) => [path, message])) : {}
}

describe('the gain of a block as typed', () => {
  it.each<BlockDefinition>([
    { kind: 'expression', expression: 'k*(s+2)/s' },
    { kind: 'expression', expression: 'k*z/(z-1)', sampleTime: 2e-5 },
    { kind: 'coefficients', numerator: [1, 0.1], denominator: [1, -0.3], sampleTime: 0.00125 },
    { kind: 'zerosPoles', zeros: [[-1, 3], [-1, -3]], poles: [[0, 0]], gain: 12, deadTime: 0.0123456789012345 },
    { kind: 'stateSpace', uploadId: 7, set: 'C2', states: 4, inputs: ['torque'], outputs: ['rate', 'angle'] },
    { kind: 'stateSpace', uploadId: 7, set: null, states: null, inputs: [], outputs: [] },
    { kind: 'sections', rows: [['16384/32768', '-0.50', '0', '1', '-.25', '1e-3']], gain: '0.10', sampleTime: 0.001 },
    { kind: 'modal', frequencyUnit: 'Hz', derivative: 1, modes: [{ name: 'bending', frequency: 12.5, damping: 0.007, gainIn: [1, 0], gainOut: [0.25] }], rigid: [{ power: -2, gainIn: [1, 1], gainOut: [2] }], inputs: [], outputs: [] },
    { kind: 'measured', uploadId: 3, mapping: { frequencyColumn: 0, frequencyUnit: 'Hz', form: 'dB and degrees', firstColumn: 1, secondColumn: 2, coherenceColumn: null, quantity: 'loopGain' }, averages: 16, openLoopUnstablePoles: 0, openLoopOriginPoles: 2 },
    { kind: 'deadTime', deadTime: 0.0005, unit: 's' },
    { kind: 'deadTime', deadTime: 1.5, unit: 'samples' },
    { kind: 'hold', hold: 'pwmDoubleUpdate', sampleTime: 5e-5, duty: 0.4 },
    { kind: 'hold', hold: 'zeroOrder', sampleTime: 0.1 },
  ])('comes back as it was stored: $kind', (definition) => {
    expect(readTypedGain(typedGain(definition, 'Hz'))).toEqual({ definition })
  })

  it('tells each field that is empty or no number, by its path', () => {
    expect(Object.keys(problemsOf({ kind: 'coefficients', sampled: true }))).toEqual(['sampleTime', 'numerator', 'denominator'])
    expect(problemsOf({ kind: 'zerosPoles', gain: 'much' })).toEqual({ gain: '\'much\' is not a number. Write it like 12.5 or 1.2e3.' })
    expect(problemsOf({ kind: 'deadTime', deadTime: '-1 ms' })).toEqual({ deadTime: 'A dead time is not negative.' })
    expect(problemsOf({ kind: 'hold', sampleTime: '0' })).toEqual({ sampleTime: 'The sample time is above zero.' })
    expect(problemsOf({ kind: 'hold', hold: 'pwmSingleUpdate', sampleTime: '20 us', duty: '40' })).toEqual({ duty: 'The duty ratio is from 0 to 1.' })
    expect(Object.keys(problemsOf({ kind: 'stateSpace', inputs: 'a a' }))).toEqual(['uploadId', 'inputs'])
  })

  it('keeps second-order sections as typed, leaves out blank rows, and tells a cell that is no number', () => {
    const rows = [['1', '0', '0', '1', '0', '0'], ['', '', '', '1', '', '']]
    expect(read({ kind: 'sections', rows, sampleTime: '1 ms' })).toEqual({ definition: { kind: 'sections', rows: [rows[0]], gain: '1', sampleTime: 0.001 } })
    expect(problemsOf({ kind: 'sections', rows: [['1', 'x', '', '1', '1/0', '1/2/3']], sampleTime: '1 ms' })).toEqual({
      'rows[0][1]': 'Section 1, b1: \'x\' is not a number and no fraction of two. Write it like -0.98 or 16384/32768.',
      'rows[0][2]': 'Type b2 of section 1; 0 where it has none.',
      'rows[0][4]': 'Section 1, a1: \'1/0\' is not a number and no fraction of two. Write it like -0.98 or 16384/32768.',
      'rows[0][5]': 'Section 1, a2: \'1/2/3\' is not a number and no fraction of two. Write it like -0.98 or 16384/32768.',
    })
  })

  it('takes damping in percent as the same decimal in ratio', () => {
    const modes = [{ name: '', frequency: '10', damping: '0.7', gainIn: ['1'], gainOut: ['1'] }]
    expect(read({ kind: 'modal', dampingUnit: '%', modes })).toMatchObject({ definition: { modes: [{ name: '1', damping: 0.007 }] } })
  })

  it('asks each mode for a gain of every channel', () => {
    const modes = [{ name: 'a', frequency: '10', damping: '0.01', gainIn: ['1'], gainOut: ['1'] }]
    expect(Object.keys(problemsOf({ kind: 'modal', inputs: 'torque, force', modes }))).toEqual(['modes[0].gainIn[1]'])
    expect(Object.keys(problemsOf({ kind: 'modal', modes: [] }))).toEqual(['modes'])
  })
})
