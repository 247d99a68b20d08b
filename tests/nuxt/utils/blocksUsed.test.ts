import { describe, expect, it } from 'vitest'
import { blocksUsed } from '~/utils/blocksUsed'
import { completionNames } from '~/utils/completionNames'
import { samplingInWords } from '~/utils/samplingInWords'
import { buildBlock } from '../builders/buildBlock'

const expression = (text: string, sampleTime?: number) => ({ kind: 'expression' as const, expression: text, ...sampleTime !== undefined && { sampleTime } })
const namesOf = (used: ReturnType<typeof blocksUsed>) => used.map(({ block, depth }) => `${block.name} ${depth}`)

describe('the blocks a loop gain uses', () => {
  it('end though blocks name each other in a circle', () => {
    const blocks = [buildBlock('A', expression('B + 1')), buildBlock('B', expression('A*2'))]
    expect(namesOf(blocksUsed('A/s', blocks, 1))).toEqual(['A 0', 'B 1'])
  })

  it('leave out parameters, channels and what no block is', () => {
    const blocks = [buildBlock('G', expression('1/s')), buildBlock('rate', expression('1'))]
    expect(namesOf(blocksUsed('k*G[rate, torque]*exp(-s*T)', blocks, 1))).toEqual(['G 0'])
    expect(blocksUsed('', blocks, 1)).toEqual([])
  })

  it('stand in order of first use, each once, with those a block names behind it', () => {
    const blocks = [buildBlock('H', expression('1')), buildBlock('F', expression('N*N')), buildBlock('N', expression('1')), buildBlock('C', expression('2'))]
    expect(namesOf(blocksUsed('C*F*N/(1 + C*H)', blocks, 1))).toEqual(['C 0', 'F 0', 'N 1', 'H 0'])
  })

  it('take the gain of the condition before that of every condition, and tell a missing one', () => {
    const blocks = [
      buildBlock('G', expression('1/s'), { byCondition: { 2: expression('P*1/s') } }),
      buildBlock('P', null, { byCondition: { 1: expression('1') } }),
    ]
    expect(namesOf(blocksUsed('G', blocks, 1))).toEqual(['G 0'])
    const [plant, payload] = blocksUsed('G', blocks, 2)
    expect(plant).toMatchObject({ ofCondition: true })
    expect(payload).toMatchObject({ definition: null, ofCondition: false, depth: 1 })
  })
})

describe('where the sample time of a loop comes from', () => {
  const hold = { kind: 'hold' as const, hold: 'zeroOrder' as const, sampleTime: 20e-6 }

  it('is not told of a continuous loop', () => {
    expect(samplingInWords([])).toBeNull()
    expect(samplingInWords([{ name: 'G', definition: expression('1/s') }, { name: 'F', definition: null }])).toBeNull()
  })

  it('names every block at a rate, and every rate where there are several', () => {
    expect(samplingInWords([{ name: 'C', definition: expression('1/(z-1)', 20e-6) }, { name: 'G', definition: expression('1/s') }, { name: 'PWM', definition: hold }])).toBe('sampled at 20.0 us by C and PWM')
    expect(samplingInWords([{ name: 'C', definition: expression('z', 1e-3) }, { name: 'PWM', definition: hold }])).toBe('sampled at 1.00 ms by C, at 20.0 us by PWM')
  })
})

describe('the names offered in an expression', () => {
  const parameters = [{ id: 1, version: 1, systemId: 1, name: 'k', unit: 'N', notes: '', position: 1, values: { 1: 2.5 } }]

  it('tell of a block its role and gain, of a parameter its value in the condition', () => {
    const blocks = [buildBlock('F', null, { role: 'filter', byCondition: { 1: expression('1/(s+1)') } })]
    expect(completionNames({ blocks, parameters, gains: {}, conditionId: 1 })).toEqual([
      { name: 'F', kind: 'block', detail: 'filter, 1/(s+1)' },
      { name: 'k', kind: 'parameter', detail: '2.500 N' },
    ])
    expect(completionNames({ blocks, parameters, gains: {}, conditionId: null }).map(({ detail }) => detail)).toEqual(['filter', 'N'])
  })

  it('carry the channels of a block with several, by number where they have no names', () => {
    const modal = { kind: 'modal' as const, frequencyUnit: 'Hz' as const, derivative: 0 as const, rigid: [], modes: [{ name: 'bending', frequency: 3, damping: 0.01, gainIn: [1], gainOut: [1, 2] }], inputs: [], outputs: [] }
    const [found] = completionNames({ blocks: [buildBlock('G', modal)], parameters: [], gains: {}, conditionId: 1 })
    expect(found).toMatchObject({ outputs: ['1', '2'], inputs: ['1'] })
  })
})
