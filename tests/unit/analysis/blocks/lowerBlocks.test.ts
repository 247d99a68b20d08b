import { describe, expect, it } from 'vitest'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import { prepareLoopGain } from '#shared/analysis/prepareLoopGain'
import { readLoopInput } from '#shared/analysis/readLoopInput'
import type { ExpressionInput, LoopInput } from '#shared/types/analysis'
import type { BlockGain } from '#shared/types/block'
import { refusalOf } from './refusal'

const analyse = (input: LoopInput) => analyseLoop(readLoopInput(input))
const over = (expression: string, blocks: Record<string, BlockGain>, rest: Partial<ExpressionInput> = {}): ExpressionInput => ({ expression, blocks, ...rest })
const refused = (expression: string, blocks: Record<string, BlockGain>, rest: Partial<ExpressionInput> = {}) => refusalOf(() => analyse(over(expression, blocks, rest)))
const gain = (expression: string, sampleTime?: number): BlockGain => ({ kind: 'expression', expression, ...sampleTime !== undefined && { sampleTime } })

const G = gain('1/(s*(s+1))')
const zoh: BlockGain = { kind: 'hold', hold: 'zeroOrder', sampleTime: 0.1 }

describe('bad loops over blocks', () => {
  it('an unknown name is told where it stands, with the nearest known one', () => {
    expect(refused('K*Gp', { G1: G }, { parameters: { K: 2 } })).toMatchObject({ path: 'expression', position: 2, message: 'Unknown name "Gp": it is no block and no parameter. Is "G1" meant?' })
    expect(refused('plnt', { plant: G }).message).toContain('Is "plant" meant?')
    expect(refused('K*Q', { plant: G }, { parameters: { K: 2 } }).message).toBe('Unknown name "Q": it is no block and no parameter.')
  })

  it('an unknown name inside a block is told in that block', () => {
    expect(refused('C', { C: gain('2*Kp') })).toMatchObject({ path: 'blocks.C.expression', position: 2 })
  })

  it('a channel that does not exist, one without a name, several channels and none written', () => {
    const plant: BlockGain = { kind: 'modal', frequencyUnit: 'Hz', derivative: 0, rigid: [], inputs: ['torque'], outputs: ['rate', 'angle'], modes: [{ name: 'first', frequency: 2, damping: 0.01, gainIn: [1], gainOut: [1, 2] }] }
    expect(refused('2*G', { G: plant })).toMatchObject({ path: 'expression', position: 2, message: 'The block G has 2 outputs and 1 input: write G[output, input], as in G[1, 1].' })
    expect(refused('G[3, 1]', { G: plant }).message).toContain('no output 3: it has 2 outputs')
    expect(refused('G[0, 1]', { G: plant }).message).toContain('no output 0')
    expect(refused('G[angel, torque]', { G: plant }).message).toContain('Is "angle" meant?')
    expect(refused('G[1]', { G: plant })).toMatchObject({ path: 'expression', position: 1 })
    expect(refused('G[1, 1', { G: plant }).message).toContain('This bracket is not closed')
    expect(refused('K[1, 1]', { G: plant }, { parameters: { K: 1 } }).message).toContain('"K" is no block')
    expect(refused('C[a, b]', { C: G }).message).toContain('have no names')
  })

  it('blocks in a circle, of any length', () => {
    expect(refused('A', { A: gain('1 + A') })).toMatchObject({ path: 'blocks.A.expression', position: 4, message: 'The block A names itself.' })
    expect(refused('A', { A: gain('B'), B: gain('C/2'), C: gain('3*A') })).toMatchObject({ path: 'blocks.C.expression', position: 2 })
    expect(refused('A', { A: gain('B'), B: gain('C/2'), C: gain('3*A') }).message).toContain('A, B, C, A')
  })

  it('a circle among blocks that the loop does not need is no fault of the loop', () => {
    expect(analyse(over('G', { G, A: gain('B'), B: gain('A') })).stability.verdict).toBe('stable')
  })

  it('two rates in one loop, whichever blocks they come from', () => {
    const slow = gain('1/(z-0.5)', 0.2)
    expect(refused('C*H*G', { C: slow, H: zoh, G })).toMatchObject({ path: 'blocks.H.sampleTime' })
    expect(refused('C*H*G', { C: slow, H: zoh, G }).message).toContain('Two rates in one loop')
    expect(refused('C', { C: slow }, { sampleTime: 0.1 }).path).toBe('blocks.C.sampleTime')
  })

  it('sample times that differ by rounding are one', () => {
    expect(analyse(over('C*D', { C: gain('0.1/(z-0.5)', 0.1), D: gain('1/z', 0.1 * (1 + 1e-14)) })).structure?.sampleTime).toBe(0.1)
  })

  it('sampled by continuous without a hold, as factor and as term', () => {
    const C = gain('1/(z-0.5)', 0.1)
    expect(refused('C*G', { C, G })).toMatchObject({ path: 'expression', message: expect.stringContaining('without a hold') })
    expect(refused('C + G', { C, G }).message).toContain('in one sum')
    expect(refused('G', { G }, { sampleTime: 0.1 }).message).toContain('The loop is sampled, but nothing in this expression is')
  })

  it('a dead time in samples in a loop without samples, and a part of a sample beside sampled parts', () => {
    expect(refused('D*G', { D: { kind: 'deadTime', deadTime: 1, unit: 'samples' }, G })).toMatchObject({ path: 'blocks.D.unit' })
    expect(refused('C*D', { C: gain('1/(z-0.5)', 0.1), D: { kind: 'deadTime', deadTime: 0.5, unit: 'samples' } }).message).toContain('no whole number of samples')
  })

  it('an algebraic loop without a solution', () => {
    // 1 + H(infinity) = 0
    expect(refused('G/(1 + H)', { G, H: gain('-(s+2)/(s+1)') }).message).toContain('algebraic loop without a solution')
    expect(refused('G/(1 + H)', { G, H: gain('-1') }).message).toContain('algebraic loop without a solution')
    expect(refused('C/(1 + C2)', { C: gain('1/(z-0.5)', 0.1), C2: gain('-(z+2)/(z+1)', 0.1) }).message).toContain('algebraic loop without a solution')
  })

  it('an improper block, of each kind', () => {
    expect(refused('G*C', { G, C: gain('s') })).toMatchObject({ path: 'blocks.C.expression', message: expect.stringContaining('Improper') })
    expect(refused('G*C', { G, C: gain('(1 + s^3)/(s^2 + 1)') })).toMatchObject({ path: 'blocks.C.expression', position: 1 })
    expect(refused('G*C', { G, C: { kind: 'coefficients', numerator: [1, 0, 0], denominator: [1, 2] } }).path).toBe('blocks.C.numerator')
    expect(refused('G*C', { G, C: { kind: 'zerosPoles', zeros: [[-1, 0]], poles: [], gain: 1 } }).path).toBe('blocks.C.zeros')
    expect(refused('C', { C: gain('z', 0.1) }).message).toContain('future samples')
  })

  it('complex coefficients, with the reason', () => {
    const reason = 'Complex coefficients are not covered'
    expect(refused('G*(1 + 2*j)', { G })).toMatchObject({ path: 'expression', position: 9, message: expect.stringContaining(reason) })
    expect(refused('2i*G', { G }).message).toContain(reason)
    expect(refused('G', { G: gain('1/(s+3j)') })).toMatchObject({ path: 'blocks.G.expression', message: expect.stringContaining(reason) })
    expect(refused('C', { C: { kind: 'zerosPoles', zeros: [], poles: [[-1, 2]], gain: 1 } })).toMatchObject({ path: 'blocks.C.poles[0]', message: expect.stringContaining(reason) })
    const numerator = [[1, 2]] as unknown as number[]
    expect(refused('C', { C: { kind: 'coefficients', numerator, denominator: [1, 1] } })).toMatchObject({ path: 'blocks.C.numerator[0]', message: expect.stringContaining(reason) })
    const text = ['1+2i'] as unknown as number[]
    expect(refused('C', { C: { kind: 'coefficients', numerator: text, denominator: [1, 1] } }).message).toContain(reason)
  })

  it('a loop gain of zero', () => {
    expect(refused('G - G', { G }).message).toContain('The expression is zero')
    expect(refused('G/(G - G)', { G }).message).toContain('zero at every frequency')
  })

  it('z in a continuous loop, a missing sign before brackets', () => {
    expect(refused('G/z', { G })).toMatchObject({ position: 2, message: expect.stringContaining('This loop is continuous') })
    expect(refused('G(s+1)', { G }).message).toContain('write G*( ... )')
  })
})

describe('a loop over blocks is the loop typed out', () => {
  const C: BlockGain = { kind: 'coefficients', numerator: [2, 1], denominator: [0.1, 1] }
  const H: BlockGain = { kind: 'zerosPoles', zeros: [[-3, 0]], poles: [[-1, 2], [-1, -2]], gain: 4 }
  const typed: ExpressionInput = { expression: 'k*C/(1 + 0.2*H)*G'.replace('C', '((2*s+1)/(0.1*s+1))').replace('H', '(4*(s+3)/((s+1)^2+4))').replace('G', '(1/(s*(s+1)))'), parameters: { k: 1.5 } }

  it('to the last bit where it is a feedback of exact parts', () => {
    const { structure, ...analysis } = analyse(over('k*C/(1 + 0.2*H)*G', { C, H, G }, { parameters: { k: 1.5 } }))
    expect(analysis).toEqual(analyse(typed))
    expect(structure).toEqual({ approximated: false, notes: [] })
  })

  it('also with a block of blocks and with a parameter inside a block', () => {
    const { structure: _, ...analysis } = analyse(over('Q', { Q: gain('k*C/(1 + 0.2*H)*G'), C, H, G }, { parameters: { k: 1.5 } }))
    expect(analysis).toEqual(analyse(typed))
  })

  it('with dead time in seconds, as a factor and inside a feedback', () => {
    const D: BlockGain = { kind: 'deadTime', deadTime: 0.05, unit: 's' }
    const { structure: _, ...analysis } = analyse(over('D*G/(1 + 0.3*D*G)', { D, G }))
    expect(analysis).toEqual(analyse({ expression: 'exp(-s*0.05)*(1/(s*(s+1)))/(1 + 0.3*exp(-s*0.05)*(1/(s*(s+1))))' }))
  })

  it('given zeros and poles stay as given where nothing is summed', () => {
    const zeros: [number, number][] = [[-0.01, 3.7], [-0.01, -3.7]]
    const poles: [number, number][] = [[0, 0], [-1 / 3, 0], [-0.1, 5.3], [-0.1, -5.3]]
    const { structure: _, ...analysis } = analyse(over('C', { C: { kind: 'zerosPoles', zeros, poles, gain: 0.7, deadTime: 0.01 } }))
    expect(analysis).toEqual(analyse({ zeros, poles, gain: 0.7, deadTime: 0.01 }))
  })

  it('coefficients are those of a loop given by them', () => {
    const given = { numerator: [0.3, 0.1, 2], denominator: [1, 0.2, 4, 0] }
    const { structure: _, ...analysis } = analyse(over('C', { C: { kind: 'coefficients', ...given } }))
    const expected = analyse(given)
    expect(analysis.stability).toEqual(expected.stability)
    analysis.gainCrossovers.forEach((crossing, i) => expect(crossing.frequency / expected.gainCrossovers[i]!.frequency - 1).toBeCloseTo(0, 13))
  })

  it('a sampled loop of sections and whole samples of delay is that of z typed out', () => {
    const sections: BlockGain = { kind: 'sections', sections: [[0.25, 0.5, 0.25, 1, -0.5, 0.0625], [1, 1, 0, 1, 0, 0]], gain: 0.5, sampleTime: 0.01 }
    const input = over('S*D*P', { S: sections, D: { kind: 'deadTime', deadTime: 2, unit: 'samples' }, P: gain('0.1/(z-1)', 0.01) })
    const { structure, ...analysis } = analyse(input)
    const { structure: _, ...expected } = analyse({ expression: '0.5*(0.25*z^2+0.5*z+0.25)/(z^2-0.5*z+0.0625)*(z^2+z)/z^2*z^-2*(0.1/(z-1))', sampleTime: 0.01 })
    expect(structure?.sampleTime).toBe(0.01)
    expect(analysis).toEqual(expected)
  })

  it('a dead time of whole samples in seconds counts as samples, rounding or not', () => {
    const P = gain('0.1/(z-1)', 0.001)
    const [a, b] = [3 * 0.001, 0.003].map(deadTime => analyse(over('D*P', { P, D: { kind: 'deadTime', deadTime, unit: 's' } })))
    expect(a).toEqual(b)
    expect(a!.gainCrossovers).toEqual(analyse({ expression: '0.1*z^-3/(z-1)', sampleTime: 0.001 }).gainCrossovers)
  })

  it('is prepared for figures with the same values', () => {
    const out = new Float64Array(2)
    const expected = new Float64Array(2)
    const loop = prepareLoopGain(readLoopInput(over('k*C/(1 + 0.2*H)*G', { C, H, G }, { parameters: { k: 1.5 } })))
    const other = prepareLoopGain(readLoopInput(typed))
    for (const w of [0.1, 1, 2.2, 10]) {
      expect(loop.evaluate(w, out)).toBe(other.evaluate(w, expected))
      expect([...out]).toEqual([...expected])
    }
  })
})

describe('a modal table', () => {
  const modes = [
    { name: 'first bending', frequency: 1.2, damping: 0.005, gainIn: [1, 0.5], gainOut: [2, -1] },
    { name: 'second bending', frequency: 3.4, damping: 0.008, gainIn: [0.3, 0.5], gainOut: [-2, 1] },
  ]
  const table: BlockGain = { kind: 'modal', frequencyUnit: 'Hz', derivative: 1, modes, rigid: [{ power: -1, gainIn: [1, 0], gainOut: [3, 0] }], inputs: ['torque', 'force'], outputs: ['rate', 'tip'] }
  const mode = (n: 0 | 1, gains: number) => `${gains}*s/(s^2 + 2*d${n}*w${n}*s + w${n}^2)`
  const parameters = { d0: 0.005, w0: 2 * Math.PI * 1.2, d1: 0.008, w1: 2 * Math.PI * 3.4 }

  it('is the sum of its modes and rigid terms typed out', () => {
    const { structure: _, ...analysis } = analyse(over('0.4*G[rate, torque]/(0.1*s+1)', { G: table }))
    // gains exact in binary but for 0.3, which is one double times -2
    expect(analysis).toEqual(analyse({ expression: `0.4*(3/s + ${mode(0, 2)} + 2*${mode(1, -0.3)})/(0.1*s+1)`, parameters }))
  })

  it('has a channel for each pair of output and input', () => {
    const { structure: _, ...analysis } = analyse(over('G[2, 2]/(s+1)', { G: table }))
    expect(analysis).toEqual(analyse({ expression: `(${mode(0, -0.5)} + ${mode(1, 0.5)})/(s+1)`, parameters }))
  })

  it('of positions, rates and accelerations differ by powers of s', () => {
    const at = (derivative: 0 | 1 | 2) => {
      const out = new Float64Array(2)
      prepareLoopGain(readLoopInput(over('G[1, 1]', { G: { ...table, derivative, rigid: [] } }))).evaluate(2, out)
      return out
    }
    const [position, rate, acceleration] = [at(0), at(1), at(2)]
    expect(rate[1]! / position[0]!).toBeCloseTo(2, 12)
    expect(acceleration[0]! / position[0]!).toBeCloseTo(-4, 12)
  })
})

describe('a mode of a table that a channel does not show', () => {
  const table = (damping: number): BlockGain => ({
    kind: 'modal', frequencyUnit: 'rad/s', derivative: 0, rigid: [{ power: -2, gainIn: [1], gainOut: [0, 1] }], inputs: [], outputs: [],
    modes: [{ name: 'seen', frequency: 3, damping: 0.1, gainIn: [1], gainOut: [1, 1] }, { name: 'unseen', frequency: 5, damping, gainIn: [1], gainOut: [0, 1] }],
  })

  it('is no part of it where it is damped', () => {
    const { structure: _, ...analysis } = analyse(over('G[1, 1]', { G: table(0.1) }))
    expect(analysis).toEqual(analyse({ expression: '1/(s^2 + 2*d*3*s + 9)', parameters: { d: 0.1 } }))
  })

  it('stays in the verdict where it is not', () => {
    expect(analyse(over('G[1, 1]', { G: table(-0.01) }))).toMatchObject({ stability: { verdict: 'unstable' }, structure: { notes: [{ block: 'G', code: 'hidden unstable' }] } })
    expect(analyse(over('G[1, 1]', { G: table(0) }))).toMatchObject({ stability: { verdict: 'marginal' }, structure: { notes: [{ block: 'G', code: 'hidden boundary' }] } })
  })
})

describe('hidden modes', () => {
  it('an unstable pole of a block that another cancels is told with its block, and the verdict knows', () => {
    const analysis = analyse(over('C*G', { C: gain('2*(s-1)/(s+5)'), G: gain('3/((s-1)*(s+2))') }))
    expect(analysis.structure?.notes).toEqual([{ block: 'G', code: 'hidden unstable', message: expect.stringContaining('the pole at s = 1 of G') }])
    expect(analysis.stability.verdict).toBe('unstable')
    expect(analysis.stability.reason).toContain('hidden cancellation')
  })

  it('an unstable mode hidden in the feedback path of an inner loop stays unstable and is told', () => {
    // P alone keeps its mode at s = 2 whatever is closed around it: 1/(1 + Q P) divides by a sum, which does not remove it
    const P: BlockGain = { kind: 'zerosPoles', zeros: [[2, 0]], poles: [[2, 0], [-1, 0]], gain: 1 }
    const Q: BlockGain = { kind: 'coefficients', numerator: [1], denominator: [1, 3] }
    for (const expression of ['Q/(1 + Q*P)', 'Q*(1/(1 + Q*P))', 'Q/(1 + P*Q)*2/(1 + Q)', 'P/(1 + P*Q)', 'Q/(1 + U*Z*Q)', 'Q/(1 + Q*P*D)']) {
      const analysis = analyse(over(expression, { P, Q, U: gain('1/(s-2)'), Z: gain('(s-2)/(s+5)'), D: { kind: 'deadTime', deadTime: 0.1, unit: 's' } }))
      expect(analysis.stability.verdict, expression).toBe('unstable')
      expect(analysis.structure?.notes, expression).toMatchObject([{ code: 'hidden unstable' }])
    }
    // the poles of the feedback path itself are zeros of the whole and hide nothing
    expect(analyse(over('Q/(1 + Q*U)', { Q, U: gain('10/(s-2)') }))).toMatchObject({ stability: { verdict: 'stable' }, structure: { notes: [] } })
  })

  describe('a pole that different blocks have in one place', () => {
    const I = gain('1/s')
    const J = gain('2/s')
    const Q = gain('1/(s+3)')
    const notesOf = (expression: string, blocks: Record<string, BlockGain>) => analyse(over(expression, blocks)).structure?.notes.map(({ message }) => message)

    it('two integrators side by side are taken as one, and it is told what they keep where they are two', () => {
      expect(notesOf('(I + J)*Q', { I, J, Q })).toEqual([expect.stringMatching(/^I and J have the same pole at s = 0, not a stable one, which is taken as one pole .* write what they share as a block of its own\.$/)])
      expect(notesOf('H*Q*I + H*Q*J', { I, J, Q, H: zoh })).toEqual([expect.stringContaining('have the same pole at ')])
    })

    it('so is an integrator before an inner loop with one in its feedback, which its zero cancels', () => {
      expect(notesOf('I*Q/(1 + Q*J)', { I, J, Q })).toEqual([expect.stringContaining('I and J have the same pole at s = 0')])
    })

    it('but not one block used twice, its channels, stable poles, or poles in a product', () => {
      const plant: BlockGain = { kind: 'modal', frequencyUnit: 'Hz', derivative: 0, modes: [], rigid: [{ power: -1, gainIn: [1], gainOut: [1, 2] }], inputs: [], outputs: [] }
      expect(notesOf('I*Q/(1 + Q*I)', { I, Q })).toEqual([])
      expect(notesOf('Q*(P[1, 1] + P[2, 1])', { Q, P: plant })).toEqual([])
      expect(notesOf('Q + R', { Q, R: gain('2/(s+3)') })).toEqual([])
      expect(notesOf('Q*I*J', { I, J, Q })).toEqual([])
      expect(notesOf('J*I*Q/(1 + Q*J)', { I, J, Q })).toEqual([])
    })
  })

  it('an integrator that a washout cancels is told as one on the boundary', () => {
    const analysis = analyse(over('C*G', { C: gain('s/(s+1)'), G }))
    expect(analysis.structure?.notes).toMatchObject([{ block: 'G', code: 'hidden boundary' }])
    expect(analysis.stability.verdict).toBe('marginal')
  })

  it('a state that its own block hides is that block\'s, though another has a pole at the same place', () => {
    // two rigid bodies, the second not reached by the input
    const plant: BlockGain = { kind: 'stateSpace', a: [[0, 0], [0, 0]], b: [[1], [0]], c: [[1, 1]], d: [[0]], inputs: [], outputs: [] }
    const { structure } = analyse(over('C*H*P', { C: gain('(z-0.9)/(z-1)', 0.1), H: zoh, P: plant }))
    expect(structure?.notes.map(({ block, code }) => [block, code])).toEqual([['P', 'unreachable'], ['P', 'hidden boundary']])
  })

  it('poles of a block in its own feedback do not stay', () => {
    expect(analyse(over('G/(1 + H*G)', { G: gain('1/(s-1)'), H: gain('5') })).structure?.notes).toEqual([])
  })
})

describe('state space among other blocks', () => {
  const plant: BlockGain = {
    kind: 'stateSpace', a: [[-1, 0, 0], [0, 2, 0], [0, 0, -3]], b: [[1, 0], [1, 0], [0, 1]], c: [[1, 0, 1], [1, 1, 0]], d: [[0, 0], [0, 0]], inputs: ['torque', 'force'], outputs: ['rate', 'angle'],
  }

  it('a channel that is zero is told by its block', () => {
    expect(refused('2*G[angle, force]', { G: plant }).message).toBe('The expression is zero: a loop gain of zero has no crossings to find. What is zero: the block G in its channel [2,2].')
  })

  it('a channel that is zero beside others is told: what the block holds is then not in L', () => {
    // the second input reaches nothing, so P's unstable state is in no term of the sum
    const unreached: BlockGain = { kind: 'stateSpace', a: [[2, 0], [0, -1]], b: [[1, 0], [1, 0]], c: [[1, 1]], d: [[0, 0]], inputs: [], outputs: [] }
    const analysis = analyse(over('G + P[1, 2]', { G: gain('1/(s+1)'), P: unreached }))
    expect(analysis.structure?.notes).toEqual([{ block: 'P', code: 'other', message: 'Its channel [1, 2] is zero: products with it are left out of L, and modes of the blocks in them, stable or not, are not in the verdict.' }])
  })

  it('is its channels typed out, in a feedback over two of them too', () => {
    const at = (input: ExpressionInput) => {
      const out = new Float64Array(2)
      const { evaluate } = prepareLoopGain(readLoopInput(input))
      return [0.1, 1, 7].flatMap(w => (evaluate(w, out), [...out]))
    }
    const blocks = at(over('K*G[rate, torque]/(1 + 5*G[angle, torque])', { G: plant, K: gain('2/(s+4)') }))
    const typed = at({ expression: '2/(s+4)/(s+1)/(1 + 5*(1/(s+1) + 1/(s-2)))' })
    blocks.forEach((value, i) => expect(value).toBeCloseTo(typed[i]!, 12))
  })

  it('modes that a channel does not show are told, and an unstable one decides the verdict', () => {
    const { structure, stability } = analyse(over('G[1, 1]', { G: plant }))
    expect(structure?.notes.map(({ block, code }) => [block, code])).toEqual([['G', 'unreachable'], ['G', 'unobservable'], ['G', 'hidden unstable']])
    expect(stability.verdict).toBe('unstable')
  })
})
