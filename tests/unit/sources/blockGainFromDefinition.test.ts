import { describe, expect, it } from 'vitest'
import { blockGainFromDefinition } from '#shared/sources/blockGainFromDefinition'
import type { BlockDefinition, SectionsDefinition, StateSpaceDefinition } from '#shared/types/block'
import type { MatrixSet } from '#shared/importers/MatrixSet'

const facts = { frequencyUnit: 'rad/s' } as const
const stateSpace: StateSpaceDefinition = { kind: 'stateSpace', uploadId: 1, set: null, states: null, inputs: [], outputs: [] }
const set = (name: string, change: Partial<MatrixSet> = {}): MatrixSet => ({ name, a: [[-1]], b: [[1]], c: [[1], [2]], d: [[0], [0]], inputs: [], outputs: ['rate', 'angle'], ...change })
const sections = (rows: string[][], gain = '1'): SectionsDefinition => ({ kind: 'sections', rows, gain, sampleTime: 0.001 })
const read = (definition: BlockDefinition, sets: MatrixSet[] = []) => blockGainFromDefinition(definition, { ...facts, sets })
const faultOf = (work: () => unknown): unknown => {
  try {
    return work()
  }
  catch (error) {
    const { path, message } = error as { path: string, message: string }
    return { path, message }
  }
}

describe('the gain of a block from its stored definition', () => {
  it('has, of sections, the numbers typed, fractions divided once', () => {
    expect(read(sections([['1', '-2', ' 1 ', '16384/32768', '\u22120.5', '1e-3']], '3/4'))).toEqual({ kind: 'sections', sections: [[1, -2, 1, 0.5, -0.5, 0.001]], gain: 0.75, sampleTime: 0.001 })
  })

  it.each(['', 'b0', '0,5', '1/0', '1/2/3', '1/', 'Infinity', '0x10'])('refuses the cell "%s" at its row and column', (cell) => {
    expect(faultOf(() => read(sections([['1', '0', '0', '1', '0', '0'], ['1', '0', '0', '1', cell, '0']])))).toMatchObject({ path: 'rows[1][4]' })
    expect(faultOf(() => read(sections([], cell)))).toMatchObject({ path: 'gain' })
  })

  it('refuses a set of matrices that the file has not, several where none is chosen, and no file', () => {
    expect(faultOf(() => read({ ...stateSpace, set: 'C4' }, [set('C1'), set('C2')]))).toEqual({ path: 'set', message: 'The file has no set C4; it has C1, C2.' })
    expect(faultOf(() => read(stateSpace, ['C1', 'C2', 'C3', 'C4', 'C5', 'C6', 'C7'].map(name => set(name))))).toEqual({ path: 'set', message: 'The file holds 7 sets of matrices (C1, C2, C3, C4, C5 and 2 more): choose one.' })
    expect(faultOf(() => read(stateSpace))).toMatchObject({ path: 'uploadId' })
  })

  it('refuses a sample time other than the file\'s, and names for another number of channels', () => {
    expect(faultOf(() => read({ ...stateSpace, sampleTime: 0.002 }, [set('C1', { sampleTime: 0.001 })]))).toMatchObject({ path: 'sampleTime' })
    expect(faultOf(() => read({ ...stateSpace, outputs: ['rate'] }, [set('C1')]))).toEqual({ path: 'outputs', message: '1 outputs are named, the matrices have 2.' })
  })

  it('takes names of channels and sample time from the file where the definition has none', () => {
    expect(read({ ...stateSpace, inputs: ['torque'] }, [set('C1', { sampleTime: 0.001 })]))
      .toEqual({ kind: 'stateSpace', a: [[-1]], b: [[1]], c: [[1], [2]], d: [[0], [0]], inputs: ['torque'], outputs: ['rate', 'angle'], sampleTime: 0.001 })
  })

  it('turns measured frequencies into the unit of the loop, hands on what is stated of its poles, and refuses a response without points', () => {
    const mapping = { frequencyColumn: 0, frequencyUnit: 'Hz', form: 'dB and degrees', firstColumn: 1, secondColumn: 2, coherenceColumn: null, quantity: 'loopGain' } as const
    const measured: BlockDefinition = { kind: 'measured', uploadId: 1, mapping, averages: 8, openLoopOriginPoles: 1 }
    expect(blockGainFromDefinition(measured, { ...facts, points: [{ frequency: 1, re: 1, im: 0 }] })).toEqual({ kind: 'measured', points: [{ frequency: 2 * Math.PI, re: 1, im: 0 }], averages: 8, openLoopOriginPoles: 1 })
    expect(faultOf(() => read(measured))).toMatchObject({ path: 'mapping' })
  })

  it('leaves what holds its numbers itself as it is', () => {
    const expression: BlockDefinition = { kind: 'expression', expression: ' k/(s+1)' }
    expect(read(expression)).toEqual(expression)
  })
})
