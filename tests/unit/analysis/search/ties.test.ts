import { describe, expect, it } from 'vitest'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import type { ComplexPair, LoopAnalysis, ZerosPolesInput } from '#shared/types/analysis'

function loop(zeros: ComplexPair[], poles: ComplexPair[], gain: number, rest: Partial<ZerosPolesInput> = {}): LoopAnalysis {
  return analyseLoop({ zeros, poles, gain, ...rest })
}

function codes({ coverage }: LoopAnalysis): (string | undefined)[] {
  return coverage.exceptions.map(({ code }) => code)
}

describe('ties, which have no finite answer, are told as such and leave the lists out', () => {
  it('k/s^2: L is real and negative at every frequency, and meets -1', () => {
    const result = loop([], [[0, 0], [0, 0]], 2)
    expect(result.coverage.exceptions).toEqual([{ from: 0, to: 'infinity', code: 'real over a stretch', reason: expect.stringContaining('real and negative') }])
    expect(result.phaseCrossovers).toEqual([])
    expect(result.gainCrossovers).toHaveLength(1)
    expect(result.gainCrossovers[0]!.frequency).toBeCloseTo(Math.SQRT2, 14)
    expect(result.stability.verdict).toBe('marginal')
    expect(result.summary).toBeNull()
  })

  it('-k/s^2 is real and positive: no phase crossover, nothing to except', () => {
    const result = loop([], [[0, 0], [0, 0]], -2)
    expect(result.coverage).toMatchObject({ proven: true, exceptions: [] })
    // closed form: s^2 - 2 has one root in the right half plane
    expect(result.stability).toMatchObject({ verdict: 'unstable', closedLoopUnstablePoles: 1 })
  })

  it('an undamped pair alone: negative above its frequency only', () => {
    const result = loop([], [[0, 3], [0, -3]], 2)
    expect(result.coverage.exceptions).toMatchObject([{ from: 3, to: 'infinity', code: 'real over a stretch' }])
    expect(result.stability.verdict).toBe('marginal')
  })

  it('an all-pass of gain 1: |L| is 1 at every frequency', () => {
    const result = loop([[3, 1], [3, -1]], [[-3, 1], [-3, -1]], 1)
    expect(codes(result)).toEqual(['unity over a stretch'])
    expect(result.gainCrossovers).toEqual([])
    // closed form: the phase is -2(atan((w - 1)/3) + atan((w + 1)/3)), 180 deg where w^2 = 10
    expect(result.phaseCrossovers).toHaveLength(1)
    expect(result.phaseCrossovers[0]!.frequency).toBeCloseTo(Math.sqrt(10), 13)
  })

  it('an all-pass of gain 1/2 is no tie', () => {
    expect(loop([[3, 0]], [[-3, 0]], 0.5).coverage.proven).toBe(true)
  })

  it.each([[2, 'stable', 3], [-0.5, 'stable', 0.5], [-1, 'marginal', 0]] as const)('L = %d constant', (gain, verdict, distance) => {
    const result = loop([], [], gain)
    expect(codes(result)).toEqual(['constant'])
    expect(result.stability.verdict).toBe(verdict)
    expect(result.vectorMargin!.distance).toBeCloseTo(distance, 15)
    expect([result.gainCrossovers, result.phaseCrossovers, result.closestApproaches]).toEqual([[], [], []])
  })

  it('|L| exactly 1 at zero frequency, and at infinity', () => {
    expect(loop([], [[-1, 0]], 1).coverage.exceptions).toMatchObject([{ from: 0, to: 0, code: 'unity at an end' }])
    expect(loop([[-1, 0]], [[-2, 0]], 1).coverage.exceptions).toMatchObject([{ to: 'infinity', code: 'unity at an end' }])
  })

  it('a biproper loop with dead time lists its first 10,000 phase crossovers and says where it stops', () => {
    const result = loop([], [], 0.5, { deadTime: 1 })
    expect(codes(result)).toEqual(['endless'])
    expect(result.phaseCrossovers).toHaveLength(10_000)
    // closed form: 0.5 exp(-jw) is real and negative at odd multiples of pi
    expect(result.phaseCrossovers[9_999]!.frequency).toBeCloseTo(19_999 * Math.PI, 8)
    expect(result.coverage.exceptions[0]!.from).toBeCloseTo(19_999 * Math.PI, 8)
    expect(result.vectorMargin!.distance).toBeCloseTo(0.5, 13)
    expect(result.stability.verdict).toBe('stable')
  })

  it('a biproper loop with dead time whose gain at infinity is under the floor is no tie', () => {
    const result = loop([[-1, 0]], [[-2, 0]], 1e-4, { deadTime: 1 })
    expect(result.coverage.proven).toBe(true)
    expect(result.vectorMargin).toEqual({ distance: expect.closeTo(1 - 1e-4, 9), frequency: 'infinity' })
  })

  it('a hump that touches |L| = 1 exactly is a tangency over a narrow stretch', () => {
    // closed form: 2s/(s + 1)^2 has |L| = 2w/(1 + w^2), 1 at w = 1 only
    const result = loop([[0, 0]], [[-1, 0], [-1, 0]], 2)
    expect(codes(result)).toEqual(['gain touch'])
    const { from, to } = result.coverage.exceptions[0]!
    expect(from).toBeLessThan(1)
    expect(to).toBeGreaterThan(1)
    expect(to as number - from).toBeLessThan(1e-6)
    expect(result.stability.verdict).toBe('stable')
  })

  it('|1 + L| constant has no minima, and is no gap in the proof', () => {
    // closed form: 1 + 2/(s - 1) = (s + 1)/(s - 1)
    const result = loop([], [[1, 0]], 2)
    expect(result.closestApproaches).toEqual([])
    expect(result.coverage.proven).toBe(true)
    expect(result.vectorMargin).toEqual({ distance: expect.closeTo(1, 14), frequency: 0 })
  })

  it('a phase that leaves 180 deg with no slope at zero frequency is told for a stretch no longer than rounding makes it', () => {
    // closed form: the w terms of arg (s^2+s+1)/(s^2+2s+2) are 1 - 2/2 = 0; the irrational roots leave some 1e-16 of it
    const h = Math.sqrt(0.75)
    const result = loop([[-0.5, h], [-0.5, -h]], [[0, 0], [0, 0], [-1, 1], [-1, -1]], 1)
    expect(codes(result)).toEqual(['phase flat at an end'])
    expect(result.coverage.exceptions[0]!.to).toBeLessThan(1e-5)
    // s^4 + 2s^3 + 3s^2 + s + 1: Routh's array is 1 3 1, 2 1, 2.5 1, 0.2, 1, all positive
    expect(result.stability.verdict).toBe('stable')
  })
})
