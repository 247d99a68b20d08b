import { describe, expect, it } from 'vitest'
import { readLoopInput } from '#shared/analysis/readLoopInput'
import { refusalOf } from './refusal'

const read = (blocks: unknown, rest: Record<string, unknown> = {}) => readLoopInput({ expression: 'G', ...rest, blocks })
const refused = (blocks: unknown, rest: Record<string, unknown> = {}) => refusalOf(() => read(blocks, rest))
const refusedGain = (gain: Record<string, unknown>) => refused({ G: gain })

const mode = { name: 'a', frequency: 2, damping: 0.01, gainIn: [1], gainOut: [1] }
const modal = { kind: 'modal', frequencyUnit: 'Hz', derivative: 0, modes: [mode], rigid: [], inputs: [], outputs: [] }
const stateSpace = { kind: 'stateSpace', a: [[-1, 2], [0, -3]], b: [[1], [0]], c: [[0, 1]], d: [[0]], inputs: [], outputs: [] }

describe('blocks that cannot be read', () => {
  it.each([
    [[], 'blocks', 'must be an object'],
    ['G', 'blocks', 'must be an object'],
    [{ G: null }, 'blocks.G', 'must be an object'],
    [{ G: {} }, 'blocks.G.kind', 'kind must be one of expression, coefficients'],
    [{ G: { kind: 'transfer function' } }, 'blocks.G.kind', '"transfer function"'],
    [{ 'G 1': modal }, 'blocks.G 1', 'cannot name a block'],
    [{ s: modal }, 'blocks.s', 'its own meaning'],
    [{ z: modal }, 'blocks.z', 'its own meaning'],
    [{ pi: modal }, 'blocks.pi', 'its own meaning'],
    [{ j: modal }, 'blocks.j', 'its own meaning'],
    [JSON.parse('{"__proto__": {"kind": "hold"}}'), 'blocks.__proto__', 'cannot name a block'],
    [Object.fromEntries(Array.from({ length: 501 }, (_, i) => [`G${i}`, modal])), 'blocks', 'at most 500'],
  ])('%j is refused at %s', (blocks, path, message) => {
    expect(refused(blocks)).toMatchObject({ path, message: expect.stringContaining(message) })
  })

  it('a name that is a parameter too', () => {
    expect(refused({ G: modal, K: modal }, { parameters: { K: 1 } })).toMatchObject({ path: 'blocks.K', message: expect.stringContaining('both a block and a parameter') })
  })

  it('blocks beside coefficients', () => {
    expect(refusalOf(() => readLoopInput({ numerator: [1], denominator: [1, 1], blocks: { G: modal } })).path).toBe('blocks')
  })

  it.each([
    [{ kind: 'expression' }, 'expression', 'must be text'],
    [{ kind: 'expression', expression: ' ' }, 'expression', 'is empty'],
    [{ kind: 'expression', expression: '1', parameters: { k: 1 } }, 'parameters', 'does not go with a block of kind expression'],
    [{ kind: 'expression', expression: '1', sampleTime: 0 }, 'sampleTime', 'above 0'],
    [{ kind: 'expression', expression: 'x'.repeat(8001) }, 'expression', '8001 characters'],
    [{ kind: 'coefficients', numerator: [1, Number.NaN], denominator: [1] }, 'numerator[1]', 'finite number'],
    [{ kind: 'coefficients', numerator: [1], denominator: [0, 0] }, 'denominator', 'is zero'],
    [{ kind: 'coefficients', numerator: [1], denominator: [1, 1], deadTime: -1 }, 'deadTime', 'cannot answer before'],
    [{ kind: 'zerosPoles', zeros: [], poles: [[-1, 1]], gain: 1 }, 'poles[0]', 'no conjugate partner'],
    [{ kind: 'zerosPoles', zeros: [], poles: [], gain: '2' }, 'gain', 'finite number'],
    [{ kind: 'sections', sections: [], gain: 1, sampleTime: 1 }, 'sections', 'at least 1'],
    [{ kind: 'sections', sections: [[1, 0, 0, 1, 0]], gain: 1, sampleTime: 1 }, 'sections[0]', '6 are needed'],
    [{ kind: 'sections', sections: [[1, 0, 0, 0, 1, 0]], gain: 1, sampleTime: 1 }, 'sections[0][3]', 'a0 = 0'],
    [{ kind: 'sections', sections: [[1, 0, 0, 1, 'x', 0]], gain: 1, sampleTime: 1 }, 'sections[0][4]', 'finite number'],
    [{ kind: 'sections', sections: [[1, 0, 0, 1, 0, 0]], gain: 1 }, 'sampleTime', 'the sample time in seconds'],
    [{ kind: 'sections', sections: Array.from({ length: 101 }, () => [1, 0, 0, 1, 0, 0]), gain: 1, sampleTime: 1 }, 'sections', 'at most 100'],
    [{ ...modal, frequencyUnit: 'rpm' }, 'frequencyUnit', '"rpm"'],
    [{ ...modal, derivative: 3 }, 'derivative', '0 (outputs are positions)'],
    [{ ...modal, modes: [], rigid: [] }, 'modes', 'The table is empty'],
    [{ ...modal, modes: [{ ...mode, frequency: 0 }] }, 'modes[0].frequency', 'A rigid body is a rigid term'],
    [{ ...modal, modes: [{ ...mode, damping: undefined }] }, 'modes[0].damping', 'finite number'],
    [{ ...modal, modes: [mode, { ...mode, gainIn: [1, 2] }] }, 'modes[1].gainIn', '1 are needed'],
    [{ ...modal, rigid: [{ power: -3, gainIn: [1], gainOut: [1] }] }, 'rigid[0].power', '0, -1 or -2'],
    [{ ...modal, rigid: [{ power: -2, gainIn: [1], gainOut: [1, 2] }] }, 'rigid[0].gainOut', '1 are needed'],
    [{ ...modal, inputs: ['a', 'b'] }, 'inputs', '2 names for 1 channel'],
    [{ ...modal, outputs: ['a,b'] }, 'outputs[0]', 'no commas'],
    [{ ...modal, outputs: ['1'] }, 'outputs[0]', 'is a number'],
    [{ ...modal, modes: Array.from({ length: 201 }, () => mode) }, 'modes', 'at most 200'],
    [{ ...stateSpace, a: [[-1, 2], [0]] }, 'a[1]', 'a[1] has 1 number, 2 are needed'],
    [{ ...stateSpace, b: [[1]] }, 'b', '1 rows, 2 are needed'],
    [{ ...stateSpace, c: [[0, 1, 2]] }, 'c[0]', '3 numbers, 2 are needed'],
    [{ ...stateSpace, d: [[0, 0]] }, 'd[0]', '2 numbers, 1 is needed'],
    [{ ...stateSpace, a: [['x', 1], [0, 1]] }, 'a[0][0]', 'finite number'],
    [{ ...stateSpace, a: [[[1, 2], 1], [0, 1]] }, 'a[0][0]', 'Complex coefficients are not covered'],
    [{ kind: 'measured', points: [{ frequency: 1, re: 1, im: 0 }] }, 'points', 'at least two'],
    [{ kind: 'measured', points: [{ frequency: 1, re: 1, im: 0 }, { frequency: 2, re: 1, im: 0, coherence: 2 }] }, 'points[1].coherence', 'between 0 and 1'],
    [{ kind: 'deadTime', deadTime: 1 }, 'unit', '"s" or "samples"'],
    [{ kind: 'deadTime', deadTime: -1, unit: 's' }, 'deadTime', 'cannot answer before'],
    [{ kind: 'hold', hold: 'firstOrder', sampleTime: 1 }, 'hold', '"firstOrder"'],
    [{ kind: 'hold', hold: 'zeroOrder' }, 'sampleTime', 'the sample time in seconds'],
    [{ kind: 'hold', hold: 'zeroOrder', sampleTime: 1, duty: 0.5 }, 'duty', 'pwm kinds'],
    [{ kind: 'hold', hold: 'pwmSingleUpdate', sampleTime: 1, duty: 1.5 }, 'duty', 'between 0 and 1'],
  ])('%j is refused at its field', (gain, path, message) => {
    expect(refusedGain(gain)).toMatchObject({ path: expect.stringMatching(/^blocks\.G\./), message: expect.stringContaining(message) })
    expect(refusedGain(gain).path).toBe(`blocks.G.${path}`)
  })
})

describe('blocks that are read', () => {
  it('come back with the fields of their kind and nothing else', () => {
    const blocks = {
      G: { ...modal, modes: [{ ...mode, remark: 'ignored' }] },
      H: { kind: 'hold', hold: 'pwmDoubleUpdate', sampleTime: 1e-4, duty: null },
    }
    expect(read(blocks)).toEqual({ expression: 'G', blocks: { G: modal, H: { kind: 'hold', hold: 'pwmDoubleUpdate', sampleTime: 1e-4 } } })
  })
})
