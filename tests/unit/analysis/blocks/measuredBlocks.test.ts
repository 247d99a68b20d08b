import { describe, expect, it } from 'vitest'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import { measuredInputOf } from '#shared/analysis/blocks/measuredInputOf'
import { prepareLoopGain } from '#shared/analysis/prepareLoopGain'
import { readLoopInput } from '#shared/analysis/readLoopInput'
import type { ExpressionInput, LoopInput, MeasuredPoint } from '#shared/types/analysis'
import type { BlockGain, MeasuredGain } from '#shared/types/block'
import { refusalOf } from './refusal'

const analyse = (input: LoopInput) => analyseLoop(readLoopInput(input))
const gain = (expression: string, sampleTime?: number): BlockGain => ({ kind: 'expression', expression, ...sampleTime !== undefined && { sampleTime } })
const logSpaced = (from: number, to: number, count: number) => Array.from({ length: count }, (_, i) => from * (to / from) ** (i / (count - 1)))

/** Points of a model, as a sweep of it would give them. */
function sweepOf(model: LoopInput, frequencies: number[], coherence?: number): MeasuredPoint[] {
  const { evaluate } = prepareLoopGain(model)
  const unit = model.frequencyUnit === 'Hz' ? 2 * Math.PI : 1
  const out = new Float64Array(2)
  return frequencies.map((frequency) => {
    evaluate(frequency * unit, out)
    return { frequency, re: out[0]!, im: out[1]!, ...coherence !== undefined && { coherence } }
  })
}

const plant: ExpressionInput = { expression: '4/(s^2+3.2*s+4)' }
const frequencies = logSpaced(0.05, 50, 400)
const G: MeasuredGain = { kind: 'measured', points: sweepOf(plant, frequencies, 0.98), averages: 32, openLoopUnstablePoles: 0 }
const C = gain('0.8*(s+0.5)/(s*(0.02*s+1))')

describe('bad loops over measured blocks', () => {
  it('two sweeps at different frequencies are not interpolated', () => {
    const H: BlockGain = { kind: 'measured', points: G.points.map(point => ({ ...point, frequency: point.frequency * 1.01 })) }
    expect(refusalOf(() => analyse({ expression: 'G*H', blocks: { G, H } }))).toMatchObject({ path: 'blocks.H.points[0]', message: expect.stringContaining('different frequencies') })
    const short: BlockGain = { kind: 'measured', points: G.points.slice(0, -1) }
    expect(refusalOf(() => analyse({ expression: 'G*H', blocks: { G, H: short } })).message).toContain('first at point 400')
  })

  it('a point at which another block has a pole, and one at which the loop gain is 0', () => {
    const oscillator: BlockGain = { kind: 'zerosPoles', zeros: [], poles: [[0, 2], [0, -2]], gain: 1 }
    const points = [1, 2, 3].map(frequency => ({ frequency, re: 1, im: -1 }))
    expect(refusalOf(() => analyse({ expression: 'Q*M', blocks: { Q: oscillator, M: { kind: 'measured', points } } }))).toMatchObject({ path: 'blocks.M.points[1]', message: expect.stringContaining('has a pole there') })
    const zero = points.map(point => point.frequency === 3 ? { frequency: 3, re: 0, im: 0 } : point)
    expect(refusalOf(() => analyse({ expression: 'M', blocks: { M: { kind: 'measured', points: zero } } })).path).toBe('blocks.M.points[2]')
  })

  it('an improper block beside it, and domains that do not go together', () => {
    expect(refusalOf(() => analyse({ expression: 'P*G', blocks: { P: gain('1 + 0.2*s'), G } }))).toMatchObject({ path: 'blocks.P.expression', message: expect.stringContaining('Improper') })
    expect(refusalOf(() => analyse({ expression: 'K*F*G', blocks: { K: gain('1/(z-0.5)', 0.1), F: gain('1/(s+1)'), G } })).message).toContain('without a hold')
    expect(refusalOf(() => analyse({ expression: 'K*D*G', blocks: { K: gain('1/(z-0.5)', 0.1), D: { kind: 'deadTime', deadTime: 0.5, unit: 'samples' }, G } })).message).toContain('no whole number of samples')
  })

  it('points out of order, and too few', () => {
    const points = [2, 1].map(frequency => ({ frequency, re: 1, im: 0 }))
    expect(refusalOf(() => analyse({ expression: 'M', blocks: { M: { kind: 'measured', points } } })).path).toBe('blocks.M.points[1].frequency')
    expect(refusalOf(() => analyse({ expression: 'M', blocks: { M: { kind: 'measured', points: points.slice(1) } } })).path).toBe('blocks.M.points')
  })
})

describe('a loop over a measured block', () => {
  it('is the measured loop of the products at its points, with coherence and averages', () => {
    const { structure, ...analysis } = analyse({ expression: '1.5*C*G', blocks: { C, G } })
    const expected = sweepOf({ expression: '1.5*0.8*(s+0.5)/(s*(0.02*s+1))*4/(s^2+3.2*s+4)' }, frequencies, 0.98)
    const whole = analyse({ measured: { quantity: 'loopGain', points: expected, averages: 32 }, openLoopUnstablePoles: 0, openLoopOriginPoles: 1 })
    expect(structure).toEqual({ approximated: false, notes: [] })
    expect(analysis.stability).toEqual(whole.stability)
    expect(analysis.stability.verdict).not.toBe('undetermined')
    expect(analysis.discs?.length).toBe(400)
    expect(analysis.samples).toBe(400)
    analysis.gainCrossovers.forEach((crossing, i) => {
      expect(crossing.frequency / whole.gainCrossovers[i]!.frequency - 1).toBeCloseTo(0, 12)
      expect(crossing.phaseMargin).toBeCloseTo(whole.gainCrossovers[i]!.phaseMargin, 9)
    })
  })

  it('has an undetermined verdict where nothing is stated of the poles of the block', () => {
    const { openLoopUnstablePoles: _, ...unstated } = G
    expect(analyse({ expression: '0.1*G', blocks: { G: unstated } }).stability).toMatchObject({ verdict: 'undetermined', reason: expect.stringContaining('state the number of open-loop unstable poles') })
  })

  it('drops the coherence where L is not proportional to the block, and says so', () => {
    const analysis = analyse({ expression: 'C*G/(1 + 0.1*G)', blocks: { C, G } })
    expect(analysis.structure?.notes).toEqual([{ block: 'G', code: 'coherence dropped', message: expect.stringContaining('not proportional') }])
    expect(analysis.discs).toBeUndefined()
    expect(analyse({ expression: 'C*Q', blocks: { C, G, Q: gain('2*G - G/2') } }).discs?.length).toBe(400)
    expect(analyse({ expression: 'C/G', blocks: { C: gain('1/(s+1)^4'), G } }).structure?.notes).toMatchObject([{ code: 'coherence dropped' }])
  })

  it('takes sampled blocks at exp(jwT) and the hold by its response, up to half the sampling frequency', () => {
    const T = 0.1
    const controller = gain('(1.2*z-1)/(z-1)', T)
    const H: BlockGain = { kind: 'hold', hold: 'zeroOrder', sampleTime: T }
    const D: BlockGain = { kind: 'deadTime', deadTime: 0.5, unit: 'samples' }
    const { input, structure } = measuredInputOf(readLoopInput({ expression: 'K*H*D*G', blocks: { K: controller, H, D, G } }))!
    const inside = frequencies.filter(frequency => frequency < Math.PI / T)
    expect(input.measured.points.length).toBe(inside.length)
    expect(structure?.sampleTime).toBe(T)
    expect(structure?.notes.map(note => note.code)).toEqual(['other', 'other'])
    input.measured.points.forEach((point, i) => {
      const w = point.frequency
      const z = [Math.cos(w * T), Math.sin(w * T)] as const
      // (1.2 z - 1)/(z - 1) sinc(wT/2) exp(-jwT/2) exp(-jwT/2) G
      const size = (z[0] - 1) ** 2 + z[1] ** 2
      const [a, b] = [((1.2 * z[0] - 1) * (z[0] - 1) + 1.2 * z[1] * z[1]) / size, (1.2 * z[1] * (z[0] - 1) - (1.2 * z[0] - 1) * z[1]) / size]
      const sinc = Math.sin(w * T / 2) / (w * T / 2)
      const [c, d] = [sinc * Math.cos(w * T), -sinc * Math.sin(w * T)]
      const [p, q] = [a * c - b * d, a * d + b * c]
      const g = G.points[i]!
      expect(point.re).toBeCloseTo(p * g.re - q * g.im, 11)
      expect(point.im).toBeCloseTo(p * g.im + q * g.re, 11)
    })
  })

  it('may stand beside sampled parts without a hold, one that was measured with it', () => {
    expect(measuredInputOf({ expression: 'K*G', blocks: { K: gain('1/(z-0.5)', 0.01), G } })?.input.measured.points.length).toBe(400)
  })

  it('counts the unstable poles of the rest', () => {
    expect(measuredInputOf({ expression: 'A*G', blocks: { A: gain('1/((s-1)*s)'), G } })?.input).toMatchObject({ openLoopUnstablePoles: 1, openLoopOriginPoles: 1 })
    expect(measuredInputOf({ expression: 'K*H*A*G', blocks: { K: gain('1/(z-1)', 0.01), H: { kind: 'hold', hold: 'pwmDoubleUpdate', sampleTime: 0.01 }, A: gain('1/(s-1)'), G } })?.input)
      .toMatchObject({ openLoopUnstablePoles: 1, openLoopOriginPoles: 1 })
  })

  it('is in the unit of the loop', () => {
    const inHz = logSpaced(0.01, 8, 100)
    const points = sweepOf({ ...plant, frequencyUnit: 'Hz' }, inHz)
    const loop = measuredInputOf({ expression: 'G/s', frequencyUnit: 'Hz', blocks: { G: { kind: 'measured', points } } })!
    expect(loop.input.frequencyUnit).toBe('Hz')
    const { re, im } = points[50]!
    const w = 2 * Math.PI * inHz[50]!
    expect(loop.input.measured.points[50]).toMatchObject({ frequency: inHz[50], re: expect.closeTo(im / w, 13), im: expect.closeTo(-re / w, 13) })
  })
})

describe('blocks of blocks over a measured one', () => {
  it('that double at every step are worked out once each', () => {
    const doubling = Object.fromEntries(Array.from({ length: 40 }, (_, i): [string, BlockGain] => [`B${i}`, gain(i === 0 ? 'G' : `(B${i - 1} + B${i - 1})/2`)]))
    const { points } = measuredInputOf({ expression: 'B39', blocks: { ...doubling, G } })!.input.measured
    expect(points[7]).toMatchObject({ re: G.points[7]!.re, im: G.points[7]!.im })
  })
})
