import { describe, expect, it } from 'vitest'
import { describeBlockGain } from '#shared/formatting/describeBlockGain'
import type { BlockDefinition, BlockGain } from '#shared/types/block'

describe('a block in a line', () => {
  it.each<[string, BlockGain | BlockDefinition]>([
    ['kP*(1+wi/s)', { kind: 'expression', expression: 'kP*(1+wi/s)' }],
    ['(z-0.9)/(z-1), in z, sampled every 20.0 us', { kind: 'expression', expression: '(z-0.9)/(z-1)', sampleTime: 20e-6 }],
    ['numerator 1, denominator 1, 2, dead time 3.00 ms', { kind: 'coefficients', numerator: [1], denominator: [1, 2], deadTime: 0.003 }],
    ['zeros none, poles -1 + 2j, -1 \u2212 2j, gain 3', { kind: 'zerosPoles', zeros: [], poles: [[-1, 2], [-1, -2]], gain: 3 }],
    ['1 state', { kind: 'stateSpace', a: [[0]], b: [[1]], c: [[1]], d: [[0]], inputs: [], outputs: [] }],
    ['2 states, 2 inputs, 1 output', { kind: 'stateSpace', a: [[0, 1], [0, 0]], b: [[0, 1], [1, 0]], c: [[1, 0]], d: [[0, 0]], inputs: [], outputs: [] }],
    ['state space from a file, set C3', { kind: 'stateSpace', uploadId: 4, set: 'C3', states: null, inputs: [], outputs: [] }],
    ['1 second-order section, gain 0.5, in z, sampled every 1.00 ms', { kind: 'sections', rows: [['1', '0', '0', '1', '0', '0']], gain: '0.5', sampleTime: 0.001 }],
    ['2 modes, 12.00 to 30.00 Hz, damping 0.0100, 1 rigid body term', {
      kind: 'modal', frequencyUnit: 'Hz', derivative: 0, inputs: [], outputs: [], rigid: [{ power: -2, gainIn: [1], gainOut: [1] }],
      modes: [{ name: 'bending', frequency: 12, damping: 0.01, gainIn: [1], gainOut: [1] }, { name: 'torsion', frequency: 30, damping: 0.01, gainIn: [1], gainOut: [1] }],
    }],
    ['0 modes', { kind: 'modal', frequencyUnit: 'Hz', derivative: 0, inputs: [], outputs: [], rigid: [], modes: [] }],
    ['dead time 1.5 samples', { kind: 'deadTime', deadTime: 1.5, unit: 'samples' }],
    ['dead time 1 sample', { kind: 'deadTime', deadTime: 1, unit: 'samples' }],
    ['zero-order hold, sampled every 20.0 us', { kind: 'hold', hold: 'zeroOrder', sampleTime: 20e-6 }],
    ['pulse width modulator, one update an edge, sampled every 20.0 us, duty 0.5', { kind: 'hold', hold: 'pwmDoubleUpdate', sampleTime: 20e-6 }],
  ])('reads %s', (words, gain) => {
    expect(describeBlockGain(gain)).toBe(words)
  })
})
