import { describe, expect, it } from 'vitest'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import type { ComplexPair, LoopAnalysis } from '#shared/types/analysis'

function sampled(zeros: ComplexPair[], poles: ComplexPair[], gain: number, deadTime = 0, sampleTime = 1): LoopAnalysis {
  return analyseLoop({ zeros, poles, gain, deadTime, sampleTime })
}

describe('sampled loops', () => {
  it('takes a dead time of whole samples as poles at z = 0', () => {
    const poles: ComplexPair[] = [[1, 0], [0.4, 0.3], [0.4, -0.3]]
    const delayed = sampled([], poles, 0.06, 2)
    const written = sampled([], [...poles, [0, 0], [0, 0]], 0.06)
    expect(delayed.coverage.proven && written.coverage.proven).toBe(true)
    expect(delayed.phaseCrossovers).toHaveLength(written.phaseCrossovers.length)
    delayed.gainCrossovers.forEach(({ frequency, phaseMargin }, i) => {
      expect(frequency).toBeCloseTo(written.gainCrossovers[i]!.frequency, 13)
      expect(phaseMargin).toBeCloseTo(written.gainCrossovers[i]!.phaseMargin, 9)
    })
    delayed.phaseCrossovers.forEach(({ frequency, gainMargin }, i) => {
      expect(frequency).toBeCloseTo(written.phaseCrossovers[i]!.frequency as number, 12)
      expect(gainMargin).toBeCloseTo(written.phaseCrossovers[i]!.gainMargin, 9)
    })
    delayed.closestApproaches.forEach(({ frequency, distance }, i) => {
      expect(frequency).toBeCloseTo(written.closestApproaches[i]!.frequency, 9)
      expect(distance).toBeCloseTo(written.closestApproaches[i]!.distance, 12)
    })
    expect(delayed.stability.closedLoopUnstablePoles).toBe(written.stability.closedLoopUnstablePoles)
  })

  it('takes 0.3 s at 0.1 s a sample as three samples, though the doubles do not divide evenly', () => {
    // closed form: 0.5 z^-3 at z = -1 is -0.5
    const result = sampled([], [], 0.5, 0.3, 0.1)
    expect(result.phaseCrossovers.at(-1)).toMatchObject({ frequency: expect.closeTo(Math.PI / 0.1, 12), gainMargin: expect.closeTo(20 * Math.log10(2), 12) })
    expect(result.stability.verdict).toBe('stable')
  })

  it('takes a dead time of a fraction of a sample as it stands', () => {
    // closed form: k/(z - 1) exp(-jw d): |L| = k/(2 sin(w/2)), arg L = -90 deg - w/2 - w d, so 180 deg at w = pi/2/(1/2 + d)
    const d = 2.3
    const result = sampled([], [[1, 0]], 0.3, d)
    expect(result.coverage.proven).toBe(true)
    const w = Math.PI / 2 / (0.5 + d)
    expect(result.phaseCrossovers[0]!.frequency).toBeCloseTo(w, 13)
    expect(result.phaseCrossovers[0]!.gainMargin).toBeCloseTo(20 * Math.log10(2 * Math.sin(w / 2) / 0.3), 10)
    // 1/2 + d turns of pi to half the sampling frequency: 2.8 pi, so 180 deg at (pi/2 + 2 pi k)/2.8, k = 0, 1
    expect(result.phaseCrossovers).toHaveLength(2)
    expect(result.phaseCrossovers[1]!.frequency).toBeCloseTo(2.5 * Math.PI / 2.8, 13)
    const crossover = 2 * Math.asin(0.15)
    expect(result.gainCrossovers[0]!.frequency).toBeCloseTo(crossover, 13)
    expect(result.gainCrossovers[0]!.phaseMargin).toBeCloseTo(90 - crossover * (0.5 + d) * 180 / Math.PI, 10)
  })

  it('does not close the locus of a fraction of a sample that ends left of -1', () => {
    // closed form: 3 exp(-jw/4) z^-3 ends at 3 exp(-j 13 pi/4), whose real part is 3 cos(135 deg) = -2.12
    const result = sampled([], [[0, 0], [0, 0], [0, 0]], 3, 0.25)
    expect(result.stability.verdict).toBe('undetermined')
    expect(result.stability.reason).toContain('no whole number of samples')
  })

  it('passes a pole at z = -1 on the outside, at the infinite end of the axis', () => {
    // closed form: z^2 + z/2 - 1/2 + k with k = 1/2 has the roots 0 and -1/2; with a double pole (z+1)^2 (z-1/2) + 1/2 = z(z^2 + 3z/2), roots 0, 0 and -3/2
    expect(sampled([], [[-1, 0], [0.5, 0]], 0.5).stability).toMatchObject({ verdict: 'stable', openLoopUnstablePoles: 0, closedLoopUnstablePoles: 0 })
    expect(sampled([], [[-1, 0], [-1, 0], [0.5, 0]], 0.5).stability).toMatchObject({ verdict: 'unstable', closedLoopUnstablePoles: 1 })
  })

  it('keeps lightly damped roots near the circle to the last digits', () => {
    // closed form: with L = k/(z^2 - 2 r cos(a) z + r^2), |L| at w = a is k/((1 - r) |1 - r exp(-2ja)|)
    const r = 1 - 1e-7
    const a = 0.3
    const pole: ComplexPair = [r * Math.cos(a), r * Math.sin(a)]
    const result = sampled([], [pole, [pole[0], -pole[1]]], 1e-3)
    const apart = result.gainCrossovers.map(({ frequency }) => frequency)
    expect(result.coverage.proven).toBe(true)
    expect(apart).toHaveLength(2)
    expect(apart[0]).toBeLessThan(a)
    expect(apart[1]).toBeGreaterThan(a)
  })

  it('leaves out what is under the floor near a zero at z = -1, and proves the rest', () => {
    const result = sampled([[-1, 0]], [[1, 0], [0.6, 0]], 0.05)
    expect(result.coverage).toMatchObject({ proven: true, to: expect.closeTo(Math.PI, 14) })
    expect(result.phaseCrossovers.every(({ gainMargin }) => gainMargin <= 60)).toBe(true)
  })
})
