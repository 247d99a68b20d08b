import { describe, expect, it } from 'vitest'
import { orderBlocks } from '#shared/analysis/blocks/orderBlocks'
import { checkExpression } from '#shared/analysis/expressions/checkExpression'
import { namesInExpression } from '#shared/analysis/expressions/namesInExpression'
import { nearestName } from '#shared/analysis/expressions/nearestName'
import type { BlockGain } from '#shared/types/block'

const gain = (expression: string): BlockGain => ({ kind: 'expression', expression })
const namesOf = (text: string) => namesInExpression(text).map(({ name, position }) => `${name}@${position}`)

describe('names in an expression', () => {
  it('are found in what is unfinished, wrong or empty', () => {
    expect(namesOf('')).toEqual([])
    expect(namesOf('K*(G+')).toEqual(['K@0', 'G@3'])
    expect(namesOf('K**$G')).toEqual(['K@0', 'G@4'])
    expect(namesOf('G[ra')).toEqual(['G@0'])
  })

  it('are not numbers, variables, pi, exp or channels', () => {
    expect(namesOf('2e5*exp(-s*T)*pi*z + G[rate, torque]*H')).toEqual(['T@11', 'G@21', 'H@37'])
    expect(namesOf('1e-3*e5')).toEqual(['e5@5'])
  })

  it('stand as often as they are written', () => {
    expect(namesOf('G/(1+G*H)')).toEqual(['G@0', 'G@5', 'H@7'])
  })
})

describe('order of blocks', () => {
  it('holds only what is needed, each after what it needs', () => {
    const blocks = { A: gain('B*C'), B: gain('C'), C: gain('1'), Q: gain('A') }
    expect(orderBlocks('2*A', blocks)).toEqual(['C', 'B', 'A'])
    expect(orderBlocks('k', blocks)).toEqual([])
  })
})

describe('nearest name', () => {
  it('is none where nothing of the name is left', () => {
    expect(nearestName('x', ['k', 'T'])).toBeNull()
    expect(nearestName('plant', ['controller'])).toBeNull()
    expect(nearestName('', ['a'])).toBeNull()
  })

  it('is the one with the fewest letters changed, capitals aside', () => {
    expect(nearestName('KP', ['Kp', 'K'])).toBe('Kp')
    expect(nearestName('plnat', ['plant', 'planet'])).toBe('plant')
    expect(nearestName('G2', ['G1', 'H'])).toBe('G1')
  })
})

describe('an expression as it is typed', () => {
  const blocks: Record<string, BlockGain> = { C: gain('2*(s+1)/s'), P: gain('s'), G: { kind: 'modal', frequencyUnit: 'Hz', derivative: 0, rigid: [], inputs: [], outputs: [], modes: [{ name: '', frequency: 1, damping: 0.1, gainIn: [1, 1], gainOut: [1] }] } }
  const names = { variable: 's' as const, parameterNames: ['k'] }

  it('is checked against names of blocks alone', () => {
    expect(checkExpression('k*C*G[1, 2]', { ...names, blocks: ['C', 'G'] })).toEqual([])
    expect(checkExpression('k*D', { ...names, blocks: ['C', 'G'] })).toEqual([{ message: 'Unknown name "D": it is no block and no parameter.', position: 2 }])
    expect(checkExpression('k*C', names)).toEqual([{ message: expect.stringContaining('no parameter of this expression'), position: 2 }])
  })

  it('is checked against their gains, a fault inside a block told where its name stands', () => {
    expect(checkExpression('k*C*G[1, 2]', { ...names, blocks }, { k: 1 })).toEqual([])
    expect(checkExpression('k*C*G', { ...names, blocks }, { k: 1 })).toEqual([{ message: expect.stringContaining('write G[output, input]'), position: 4 }])
    expect(checkExpression('k*C*P', { ...names, blocks }, { k: 1 })).toEqual([{ message: expect.stringContaining('Improper'), position: 4 }])
  })

  it('in z takes the sample time of its blocks', () => {
    const controller: BlockGain = { kind: 'expression', expression: '1/(z-0.5)', sampleTime: 0.02 }
    expect(checkExpression('C*z^-1', { variable: 'z', parameterNames: [], blocks: { C: controller } }, {})).toEqual([])
    expect(checkExpression('C*z^-1', { variable: 's', parameterNames: [], blocks: { C: controller } }, {})).toEqual([])
  })

  it('is checked over a measured block', () => {
    const measured: BlockGain = { kind: 'measured', points: [{ frequency: 1, re: 1, im: 0 }, { frequency: 2, re: 0.5, im: -0.1 }] }
    expect(checkExpression('C*M', { ...names, blocks: { ...blocks, M: measured } }, {})).toEqual([])
  })
})
