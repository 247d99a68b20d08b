import { describe, expect, it } from 'vitest'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import { prepareLoopGain } from '#shared/analysis/prepareLoopGain'
import { readLoopInput } from '#shared/analysis/readLoopInput'
import { sampleTimeOfInput } from '#shared/analysis/sampleTimeOfInput'
import type { ExpressionInput, LoopInput } from '#shared/types/analysis'
import type { BlockGain, ModalGain } from '#shared/types/block'
import { refusalOf } from './refusal'

const T = 0.1
const analyse = (input: LoopInput) => analyseLoop(readLoopInput(input))
const gain = (expression: string, sampleTime?: number): BlockGain => ({ kind: 'expression', expression, ...sampleTime !== undefined && { sampleTime } })
const hold: BlockGain = { kind: 'hold', hold: 'zeroOrder', sampleTime: T }
const samples = (deadTime: number): BlockGain => ({ kind: 'deadTime', deadTime, unit: 'samples' })
const blocks: Record<string, BlockGain> = { H: hold, K: gain('(2*z-1)/(z-0.5)', T), G: gain('1/(s+1)'), F: gain('10/(s+10)'), D: samples(1), I: gain('1/s') }
const over = (expression: string, more: Record<string, BlockGain> = {}): ExpressionInput => ({ expression, blocks: { ...blocks, ...more } })
const refused = (expression: string, more: Record<string, BlockGain> = {}) => refusalOf(() => analyse(over(expression, more)))

function valuesOf(input: LoopInput, frequencies: readonly number[]): [number, number][] {
  const { evaluate } = prepareLoopGain(readLoopInput(input))
  const out = new Float64Array(2)
  return frequencies.map((w) => {
    expect(evaluate(w, out)).toBe(true)
    return [out[0]!, out[1]!]
  })
}

const frequencies = [0.01, 0.3, 1, 4, 11, 25, 31]

/** Both loop gains agree on the axis to a relative 1e-12. */
function expectSame(a: LoopInput, b: LoopInput) {
  const [left, right] = [valuesOf(a, frequencies), valuesOf(b, frequencies)]
  left.forEach(([re, im], i) => {
    const [x, y] = right[i]!
    expect(Math.hypot(re - x, im - y) / Math.hypot(x, y)).toBeLessThan(1e-12)
  })
}

/** In z; a = exp(-T), closed forms of the zero-order hold (step response, one sample late). */
const a = Math.exp(-T)
const inZ = (expression: string, parameters: Record<string, number> = {}): ExpressionInput => ({ expression, sampleTime: T, parameters: { a, T, ...parameters } })

describe('bad loops with a hold', () => {
  it('two holds in one product that are not each in brackets with their own continuous part', () => {
    const H2 = { H2: hold }
    expect(refused('K*H*G*H2*F', H2)).toMatchObject({ path: 'expression', message: expect.stringContaining('Two holds') })
    expect(refused('H*G*(H2*F)', H2).message).toContain('Two holds')
    expect(refused('(H*G)*(H2)', H2).message).toContain('Two holds')
    expect(refused('H^2*G').message).toContain('only once')
  })

  it('a hold that is divided by', () => {
    expect(refused('K/H').message).toContain('cannot be divided by')
  })

  it('a dead time inside a continuous feedback or sum behind the hold', () => {
    expect(refused('K*H*G/(1 + D*F)').message).toContain('Behind the hold H')
    expect(refused('H*(G + D*F)').message).toContain('no finite equivalent')
  })

  it('continuous parts without a hold, told at their place', () => {
    expect(refused('K*H*G + F')).toMatchObject({ path: 'expression', message: expect.stringContaining('stand in one sum') })
    expect(refused('K*G*F').message).toContain('without a hold')
    expect(refused('G/(1 + K*H*G)').message).toContain('without a hold')
  })

  it('a hold in a loop of another rate', () => {
    expect(refused('K*Q*G', { Q: { kind: 'hold', hold: 'zeroOrder', sampleTime: 0.2 } })).toMatchObject({ path: 'blocks.Q.sampleTime', message: expect.stringContaining('Two rates') })
  })

  it('a plant with direct feedthrough behind a hold of impulses, at the place of the product', () => {
    expect(refused('2 + K*P*F/F', { P: { kind: 'hold', hold: 'pwmDoubleUpdate', sampleTime: T } })).toMatchObject({ path: 'expression', position: expect.any(Number) })
  })

  it('a band that begins above half the sampling frequency of the blocks', () => {
    expect(refusalOf(() => analyse({ ...over('K*H*G'), band: [40, 50] })).path).toBe('band[0]')
  })
})

describe('a hold and what is continuous in its product', () => {
  it('are the discrete equivalent: closed forms of 1/(s+1) and 1/s', () => {
    expectSame(over('K*H*G'), inZ('(2*z-1)/(z-0.5)*(1-a)/(z-a)'))
    expectSame(over('K*H*I'), inZ('(2*z-1)/(z-0.5)*T/(z-1)'))
  })

  it('whichever order and brackets the factors stand in', () => {
    const expected = over('K*H*(F*G)')
    for (const expression of ['F*K*G*H', '(K*H*G)*F', 'F*(H*G)*K', 'K*(F*H)*G', 'K*H*F/(s+1)', 'K*Q', 'G*R']) {
      expectSame(over(expression, { Q: gain('H*F*G'), R: gain('K*H*F') }), expected)
    }
  })

  it('each by itself where two holds stand in brackets', () => {
    // two samplers: the product of both equivalents, not the equivalent of the product
    expectSame(over('(H*G)*(H*I)'), inZ('(1-a)/(z-a)*T/(z-1)'))
    expect(valuesOf(over('(H*G)*(H*I)'), [5])[0]![0]).not.toBeCloseTo(valuesOf(over('H*G*I'), [5])[0]![0], 3)
  })

  it('as one sum behind the same hold, which can go on to a continuous part', () => {
    expectSame(over('(H*G + 2*H*I)*F'), over('H*(G + 2*I)*F'))
  })

  it('as a sum of equivalents where a sampled part stands in a term, or a dead time', () => {
    expectSame(over('H*G + K*H*I'), inZ('(1-a)/(z-a) + (2*z-1)/(z-0.5)*T/(z-1)'))
    expectSame(over('H*G + D*H*I'), inZ('(1-a)/(z-a) + z^-1*T/(z-1)'))
    expectSame(over('1 + H*G'), inZ('1 + (1-a)/(z-a)'))
  })

  it('in a feedback of samples', () => {
    expectSame(over('K*H*G/(1 + 0.5*H*G)'), inZ('(2*z-1)/(z-0.5)*((1-a)/(z-a))/(1 + 0.5*(1-a)/(z-a))'))
  })

  it('with whole samples of delay on either side of the hold, and a part of one behind it', () => {
    expectSame(over('K*D*H*G'), inZ('(2*z-1)/(z-0.5)*z^-1*(1-a)/(z-a)'))
    expectSame(over('D*K + K', {}), inZ('(2*z-1)/(z-0.5)*(1 + z^-1)'))
    // 1/s half a sample late: T/2 (z + 1)/(z (z - 1))
    expectSame(over('H*I*D', { D: samples(0.5) }), inZ('T/2*(z+1)/(z*(z-1))'))
  })

  it('tells the sample time and the accuracy', () => {
    const { structure } = analyse(over('0.1*K*H*G'))
    expect(structure?.sampleTime).toBe(T)
    expect(structure?.accuracy?.relative).toBeLessThan(1e-12)
    expect(sampleTimeOfInput(over('K*H*G'))).toBe(T)
    expect(sampleTimeOfInput(over('F*G'))).toBeUndefined()
  })
})

describe('a plant of many modes behind a hold', () => {
  const modes = Array.from({ length: 20 }, (_, k) => ({ name: `mode ${k + 1}`, frequency: 11 + 7 * k, damping: 0.005, gainIn: [1], gainOut: [k % 2 ? 1 : -0.7, 0.3 + k] }))
  const table: ModalGain = { kind: 'modal', frequencyUnit: 'Hz', derivative: 1, modes, rigid: [{ power: -1, gainIn: [1], gainOut: [1, 2] }], inputs: [], outputs: [] }
  const H: BlockGain = { kind: 'hold', hold: 'zeroOrder', sampleTime: 1e-3 }
  const at = [3, 11.1, 40, 152, 300].map(f => 2 * Math.PI * f)

  it('is the sum of its modes one by one, whose zeros do not crowd about z = 1', () => {
    const whole = valuesOf({ expression: 'H*G[1, 1]', blocks: { H, G: table } }, at)
    const parts = [{ ...table, modes: [] }, ...modes.map(mode => ({ ...table, modes: [mode], rigid: [] }))].map(G => valuesOf({ expression: 'H*G[1, 1]', blocks: { H, G } }, at))
    whole.forEach(([re, im], i) => {
      const [x, y] = parts.reduce(([p, q], values) => [p + values[i]![0], q + values[i]![1]], [0, 0])
      const size = parts.reduce((sum, values) => sum + Math.hypot(...values[i]!), 0)
      expect(Math.hypot(re - x, im - y) / size).toBeLessThan(1e-12)
    })
  })

  it('shares its poles among its channels: nothing is hidden in a sum of two', () => {
    const { structure, stability } = analyse({ expression: 'A*H*G[1, 1] + 0.01*B*H*G[2, 1]', blocks: { H, G: table, A: gain('0.5*z/(z-0.5)', 1e-3), B: gain('1/z', 1e-3) } })
    expect(structure?.notes).toEqual([])
    expect(stability.openLoopUnstablePoles).toBe(0)
  })
})
