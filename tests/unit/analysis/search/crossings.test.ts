import { describe, expect, it } from 'vitest'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import type { ComplexPair, LoopAnalysis, ZerosPolesInput } from '#shared/types/analysis'

const DEGREES = 180 / Math.PI

/** Poles s^2 + 2 damping w s + w^2. */
function mode(w: number, damping: number): ComplexPair[] {
  const im = w * Math.sqrt(1 - damping * damping)
  return [[-damping * w, im], [-damping * w, -im]]
}

function loop(zeros: ComplexPair[], poles: ComplexPair[], gain: number, rest: Partial<ZerosPolesInput> = {}): LoopAnalysis {
  return analyseLoop({ zeros, poles, gain, ...rest })
}

describe('crossings of loops with closed forms', () => {
  it('finds both crossings and the closest approach of 3/(s+1)^3', () => {
    // closed form: |L| = 1 at w = sqrt(3^(2/3) - 1); L real at w = sqrt 3 where |L| = 3/8; min |1+L| = 5/11 (Astrom and Murray, Feedback Systems, 2008, ch. 9)
    const result = loop([], [[-1, 0], [-1, 0], [-1, 0]], 3)
    const w = Math.sqrt(3 ** (2 / 3) - 1)
    expect(result.gainCrossovers).toHaveLength(1)
    expect(result.gainCrossovers[0]!.frequency).toBeCloseTo(w, 13)
    expect(result.gainCrossovers[0]!.phaseMargin).toBeCloseTo(180 - 3 * Math.atan(w) * DEGREES, 10)
    expect(result.phaseCrossovers).toHaveLength(1)
    expect(result.phaseCrossovers[0]!.frequency).toBeCloseTo(Math.sqrt(3), 13)
    expect(result.phaseCrossovers[0]!.gainMargin).toBeCloseTo(20 * Math.log10(8 / 3), 10)
    expect(result.vectorMargin!.distance).toBeCloseTo(5 / 11, 12)
    expect(result.stability.verdict).toBe('stable')
    expect(result.coverage).toEqual({ proven: true, from: 0, to: 'infinity', exceptions: [] })
  })

  it('lists both phase crossovers of a conditionally stable loop, at exactly 2 and 3 rad/s', () => {
    // 3(s+6)^2/(s(s+1)^2): |L| = 12 at w = 2 and 4.5 at w = 3, closed form (Astrom and Murray, Feedback Systems, ch. 9, from memory)
    const result = loop([[-6, 0], [-6, 0]], [[0, 0], [-1, 0], [-1, 0]], 3)
    expect(result.phaseCrossovers.map(({ frequency }) => frequency)).toEqual([expect.closeTo(2, 12), expect.closeTo(3, 12)])
    expect(result.phaseCrossovers[0]!.gainMargin).toBeCloseTo(-20 * Math.log10(12), 10)
    expect(result.phaseCrossovers[1]!.gainMargin).toBeCloseTo(-20 * Math.log10(4.5), 10)
    expect(result.stability).toMatchObject({ verdict: 'stable', encirclements: 0, closedLoopUnstablePoles: 0 })
  })

  it('gives two crossings to a hump that peaks at 1 + 1e-7 and none to one at 1 - 1e-7', () => {
    // closed form: a resonance alone, k w0^2/(s^2 + 2 z w0 s + w0^2), peaks at k/(2 z sqrt(1 - z^2))
    const damping = 0.01
    const peak = 1 / (2 * damping * Math.sqrt(1 - damping * damping))
    for (const [excess, count] of [[1e-7, 2], [-1e-7, 0]] as const) {
      const result = loop([], mode(100, damping), (1 + excess) / peak * 100 * 100)
      expect(result.gainCrossovers).toHaveLength(count)
      expect(result.coverage.proven).toBe(true)
    }
  })

  it('finds hundreds of phase crossovers of a long dead time, none missed', () => {
    // closed form: exp(-s)/s: arg L = -90 deg - w, so 180 deg at w = pi/2 + 2 pi k; |L| = 1/w
    const result = loop([], [[0, 0]], 1, { deadTime: 1 })
    expect(result.phaseCrossovers).toHaveLength(Math.floor((1000 - Math.PI / 2) / (2 * Math.PI)) + 1)
    result.phaseCrossovers.forEach(({ frequency, gainMargin }, k) => {
      const exact = Math.PI / 2 + 2 * Math.PI * k
      expect(Math.abs(frequency as number / exact - 1)).toBeLessThan(1e-12)
      expect(gainMargin).toBeCloseTo(20 * Math.log10(exact), 9)
    })
    expect(result.coverage.proven).toBe(true)
  })

  it('takes a sampled integrator to half its sampling frequency, where L is real', () => {
    // closed form: k/(z - 1) at z = -1 is -k/2; |L| = 1 where 2 sin(w/2) = k
    const result = loop([], [[1, 0]], 0.5, { sampleTime: 1 })
    expect(result.gainCrossovers[0]!.frequency).toBeCloseTo(2 * Math.asin(0.25), 13)
    expect(result.phaseCrossovers).toEqual([{
      frequency: expect.closeTo(Math.PI, 13), gainMargin: expect.closeTo(20 * Math.log10(4), 12), slope: 'falling', distance: expect.closeTo(0.75, 12),
    }])
    expect(result.vectorMargin).toEqual({ distance: expect.closeTo(0.75, 12), frequency: expect.closeTo(Math.PI, 13) })
    expect(result.stability.verdict).toBe('stable')
  })
})
