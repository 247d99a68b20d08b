import { describe, expect, it } from 'vitest'
import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'
import { analyseMeasured } from '#shared/analysis/measured/analyseMeasured'
import type { MeasuredInput } from '#shared/types/analysis'
import { type Complex, logSpaced, rational, sampleResponse } from './sampleResponse'

/** 3 / (s + 1)^3: Astrom and Murray, Feedback Systems, ch. 9: gain margin 2.67, phase margin 41.7 deg; exact: phase crossover sqrt 3, gain margin 8/3. */
const thirdOrder = rational([3], [1, 3, 3, 1])
/** A line on log axes, size (1 / w)^power at a constant phase: its interpolant is exact. */
const line = (power: number, phase: number) => (w: number): Complex => [w ** -power * Math.cos(phase), w ** -power * Math.sin(phase)]

function pathOf(input: MeasuredInput): string {
  try {
    analyseMeasured(input)
  }
  catch (error) {
    if (error instanceof AnalysisInputError) return error.path
    throw error
  }
  throw new Error('the input was accepted')
}

describe('analyseMeasured refuses', () => {
  it('a sensitivity of 0 and a complementary sensitivity of 1, whose loop gain is infinite', () => {
    const points = [{ frequency: 1, re: 0.5, im: 0.5 }, { frequency: 2, re: 0, im: 0 }]
    expect(pathOf({ measured: { quantity: 'sensitivity', points } })).toBe('measured.points[1]')
    expect(pathOf({ measured: { quantity: 'complementarySensitivity', points: points.map(point => ({ ...point, re: 1 - point.re })) } })).toBe('measured.points[1]')
  })

  it('a loop gain of exactly 0, which has no phase', () => {
    expect(pathOf({ measured: { quantity: 'returnDifference', points: [{ frequency: 1, re: 2, im: 0 }, { frequency: 2, re: 1, im: 0 }] } })).toBe('measured.points[1]')
  })

  it('a single sample beside one at frequency 0', () => {
    expect(pathOf({ measured: { quantity: 'loopGain', points: [{ frequency: 0, re: 1, im: 0 }, { frequency: 1, re: 1, im: -1 }] } })).toBe('measured.points')
  })

  it('a band without samples', () => {
    expect(pathOf(sampleResponse(thirdOrder, [1, 2, 3], { band: [3, 5] }))).toBe('band')
    expect(pathOf(sampleResponse(thirdOrder, [1, 2, 3], { band: [0, 0.5] }))).toBe('band')
  })
})

describe('analyseMeasured, on lines over log axes, which its interpolant follows exactly', () => {
  it('finds the gain crossover of two samples, closed form w = 1, with phase and delay margin', () => {
    const { gainCrossovers } = analyseMeasured(sampleResponse(line(1, -Math.PI / 2), [0.5, 4]))
    expect(gainCrossovers).toHaveLength(1)
    expect(gainCrossovers[0]!.frequency).toBeCloseTo(1, 12)
    expect(gainCrossovers[0]!.phaseMargin).toBeCloseTo(90, 10)
    expect(gainCrossovers[0]!.delayMargin).toBeCloseTo(Math.PI / 2, 12)
    expect(gainCrossovers[0]!.slope).toBe('falling')
  })

  it('takes the delay of a crossover beyond -180 deg from the turn that is left', () => {
    const { gainCrossovers: [crossover] } = analyseMeasured(sampleResponse(line(2, -200 * Math.PI / 180), [0.5, 2]))
    expect(crossover!.phaseMargin).toBeCloseTo(-20, 10)
    expect(crossover!.delayMargin).toBeCloseTo(340 * Math.PI / 180, 10)
  })

  it('counts frequencies in Hz as such: the delay is an angle over 2 pi f', () => {
    const { gainCrossovers: [crossover] } = analyseMeasured(sampleResponse(line(1, -Math.PI / 2), [0.5, 4], { frequencyUnit: 'Hz' }))
    expect(crossover!.frequency).toBeCloseTo(1, 12)
    expect(crossover!.delayMargin).toBeCloseTo(0.25, 12)
  })

  it('finds the minimum of |1 + L| within a gap: L = (-1 + 0.1 j) w^-1 comes nearest at w = 1.01, where it is 0.1 / sqrt 1.01 away', () => {
    // |1 + c (-1 + 0.1j)|^2 = (1 - c)^2 + 0.01 c^2 is least at c = 1 / 1.01, 0.01 / 1.01 there; w = 1 / c.
    const { closestApproaches, vectorMargin } = analyseMeasured(sampleResponse(w => [-1 / w, 0.1 / w], [0.9, 0.95, 1.3]))
    expect(closestApproaches).toHaveLength(1)
    expect(closestApproaches[0]!.frequency).toBeCloseTo(1.01, 8)
    expect(closestApproaches[0]!.distance).toBeCloseTo(0.1 / Math.sqrt(1.01), 10)
    expect(vectorMargin).toEqual({ frequency: closestApproaches[0]!.frequency, distance: closestApproaches[0]!.distance })
    // The change that takes (-1 + 0.1 j) / 1.01 to -1: gain 1.01 / sqrt 1.01, phase atan 0.1 of lead.
    expect(closestApproaches[0]!.gainChange).toBeCloseTo(10 * Math.log10(1.01), 8)
    expect(closestApproaches[0]!.phaseChange).toBeCloseTo(Math.atan(0.1) * 180 / Math.PI, 8)
  })

  it('tells samples in a row on the negative real axis as a stretch, and lists none', () => {
    const { phaseCrossovers, coverage } = analyseMeasured(sampleResponse(line(1, Math.PI), [2, 3, 4]))
    expect(phaseCrossovers).toEqual([])
    expect(coverage.exceptions).toMatchObject([{ from: 2, to: 4, code: 'realOverStretch', leastDistance: 0.5 }])
  })

  it('tells samples in a row at magnitude 1 as a stretch, and lists none', () => {
    const { gainCrossovers, coverage } = analyseMeasured(sampleResponse(line(0, -1), [2, 3, 4]))
    expect(gainCrossovers).toEqual([])
    expect(coverage.exceptions.map(exception => exception.code)).toEqual(['unitGainOverStretch'])
  })

  it('lists a crossing that falls on a sample once', () => {
    const { gainCrossovers } = analyseMeasured(sampleResponse(line(1, -2), [0.5, 1, 2]))
    expect(gainCrossovers.map(crossover => crossover.frequency)).toEqual([1])
  })

  it('tells a sample that touches magnitude 1 and turns back', () => {
    const sizes = [2, 1, 2]
    const { gainCrossovers, coverage } = analyseMeasured(sampleResponse(w => [0, -sizes[w - 1]!], [1, 2, 3]))
    expect(gainCrossovers).toEqual([])
    expect(coverage.exceptions).toMatchObject([{ from: 2, to: 2, code: 'gainTangency' }])
  })

  it('is marginal when a sample lies on -1', () => {
    const values: Complex[] = [[-1.2, -0.1], [-1, 0], [-0.8, 0.1]]
    const { stability, summary } = analyseMeasured(sampleResponse(w => values[w - 1]!, [1, 2, 3], { stayedStable: true }))
    expect([stability.verdict, summary]).toEqual(['marginal', null])
  })
})

describe('analyseMeasured, on 3 / (s + 1)^3', () => {
  const analysis = analyseMeasured(sampleResponse(thirdOrder, logSpaced(0.02, 50, 400), { openLoopUnstablePoles: 0, openLoopOriginPoles: 0, gainFloor: -40 }))

  it('finds its crossings to the accuracy of the samples', () => {
    expect(analysis.gainCrossovers.map(crossover => crossover.frequency)).toEqual([expect.closeTo(1.03927081314, 7)])
    expect(analysis.gainCrossovers[0]!.phaseMargin).toBeCloseTo(41.69032613, 5)
    expect(analysis.phaseCrossovers.map(crossover => crossover.frequency)).toEqual([expect.closeTo(Math.sqrt(3), 7)])
    expect(analysis.phaseCrossovers[0]!.gainMargin).toBeCloseTo(20 * Math.log10(8 / 3), 5)
    expect(analysis.vectorMargin!.distance).toBeCloseTo(5 / 11, 6)
  })

  it('counts it stable', () => {
    expect(analysis.stability).toMatchObject({ verdict: 'stable', basis: 'counted', encirclements: 0, closedLoopUnstablePoles: 0 })
  })

  it('summarises the smallest margins, what the vector margin implies, and the peaks', () => {
    expect(analysis.summary).toMatchObject({ gainDecrease: null, phaseLead: null, impliedGainIncrease: expect.closeTo(20 * Math.log10(11 / 6), 4) })
    expect(analysis.summary!.gainIncrease).toBe(analysis.phaseCrossovers[0]!.gainMargin)
    expect(analysis.summary!.sensitivityPeak).toBeCloseTo(2.2, 5)
    // Peak of |L / (1 + L)| at 1.2039 rad/s, computed separately from the coefficients.
    expect(analysis.summary!.complementarySensitivityPeak).toBeCloseTo(1.579795897, 4)
  })

  it('has no exceptions, and is not proven', () => {
    expect(analysis.coverage).toEqual({ proven: false, from: 0.02, to: 50, exceptions: [] })
  })

  it('keeps to the band asked for, ends included', () => {
    const { gainCrossovers, phaseCrossovers, vectorMargin, coverage } = analyseMeasured(sampleResponse(thirdOrder, logSpaced(0.02, 50, 400), { band: [1.4, 1.5] }))
    expect([gainCrossovers, phaseCrossovers]).toEqual([[], []])
    const [re, im] = thirdOrder(1.4)
    expect(vectorMargin).toEqual({ frequency: 1.4, distance: expect.closeTo(Math.hypot(1 + re, im), 6) })
    expect(coverage).toMatchObject({ from: 1.4, to: 1.5 })
  })

  it('names what of the band the samples do not reach', () => {
    const { coverage } = analyseMeasured(sampleResponse(thirdOrder, logSpaced(0.5, 5, 100), { band: [0.1, 10] }))
    expect(coverage.exceptions).toMatchObject([{ from: 0.1, to: 0.5, code: 'outsideData' }, { from: 5, to: 10, code: 'outsideData' }])
  })

  it('leaves out crossings under the gain floor', () => {
    const { phaseCrossovers, closestApproaches } = analyseMeasured(sampleResponse(thirdOrder, logSpaced(0.02, 50, 400), { gainFloor: -8 }))
    expect(phaseCrossovers).toEqual([])
    expect(closestApproaches).toHaveLength(1)
  })

  it.each(['returnDifference', 'sensitivity', 'complementarySensitivity'] as const)('is the same from its %s', (quantity) => {
    const other = analyseMeasured(sampleResponse(thirdOrder, logSpaced(0.02, 50, 400), { quantity, openLoopUnstablePoles: 0, openLoopOriginPoles: 0, gainFloor: -40 }))
    expect(other.gainCrossovers[0]!.frequency).toBeCloseTo(analysis.gainCrossovers[0]!.frequency, 10)
    expect(other.phaseCrossovers[0]!.gainMargin).toBeCloseTo(analysis.phaseCrossovers[0]!.gainMargin, 8)
    expect(other.vectorMargin!.distance).toBeCloseTo(analysis.vectorMargin!.distance, 10)
    expect(other.stability).toEqual(analysis.stability)
  })

  it('leaves out a sample at frequency 0 and says so', () => {
    const { coverage, gainCrossovers, stability } = analyseMeasured(sampleResponse(thirdOrder, [0, ...logSpaced(0.02, 50, 400)], { openLoopUnstablePoles: 0, gainFloor: -40 }))
    expect(coverage.exceptions).toMatchObject([{ from: 0, to: 0.02, code: 'frequencyZero', leastDistance: expect.any(Number) }])
    expect([gainCrossovers.length, stability.verdict]).toEqual([1, 'stable'])
  })
})

describe('analyseMeasured, on loops of several crossings', () => {
  it('finds both phase crossovers of a conditionally stable loop, one each way', () => {
    // 3 (s + 6)^2 / (s (s + 1)^2): Astrom and Murray, Feedback Systems, ch. 9, conditionally stable.
    // atan w - atan(w / 6) = 45 deg is 5 w = 6 + w^2: phase crossovers at w = 2 and 3.
    const analysis = analyseMeasured(sampleResponse(rational([3, 36, 108], [1, 2, 1, 0]), logSpaced(0.05, 500, 600), { openLoopUnstablePoles: 0, openLoopOriginPoles: 1 }))
    expect(analysis.phaseCrossovers.map(crossover => [crossover.frequency, crossover.slope])).toEqual([[expect.closeTo(2, 5), 'falling'], [expect.closeTo(3, 5), 'rising']])
    expect(analysis.stability).toMatchObject({ verdict: 'stable', encirclements: 0 })
    expect(analysis.summary!.gainDecrease).toBeLessThan(0)
    expect(analysis.summary!.gainIncrease).toBeNull()
  })

  it('counts one encirclement for an unstable plant that is stabilised', () => {
    // (s + 2) / (s^2 - 1): Astrom and Murray, Feedback Systems, ch. 9, inverted pendulum: N = P = 1, least distance 0.5.
    const analysis = analyseMeasured(sampleResponse(rational([1, 2], [1, 0, -1]), logSpaced(0.01, 200, 500), { openLoopUnstablePoles: 1, openLoopOriginPoles: 0 }))
    expect(analysis.stability).toMatchObject({ verdict: 'stable', encirclements: 1, closedLoopUnstablePoles: 0 })
  })

  it('lists the first 10,000 of a kind and says where the list stops', () => {
    const { gainCrossovers, coverage } = analyseMeasured(sampleResponse(w => [0, w % 2 === 0 ? -1.1 : -0.9], Array.from({ length: 10_003 }, (_, index) => index + 1)))
    expect(gainCrossovers).toHaveLength(10_000)
    expect(coverage.exceptions.find(exception => exception.code === 'listLimit')).toMatchObject({ from: gainCrossovers.at(-1)!.frequency, to: 10_003, reason: expect.stringContaining('10002 gain crossovers') })
  })

  it('turns the tie of a double integrator alone into a stretch', () => {
    const { coverage } = analyseMeasured(sampleResponse(w => [-1 / (w * w), 0], logSpaced(0.1, 0.5, 20)))
    expect(coverage.exceptions.map(exception => exception.code)).toContain('realOverStretch')
  })
})
