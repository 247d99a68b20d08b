import { describe, expect, it } from 'vitest'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import type { ComplexPair, LoopAnalysis, ZerosPolesInput } from '#shared/types/analysis'

/** A biproper loop with a resonance, an antiresonance and one pole in the right half plane, with finds of each kind to map about. */
const ZEROS: ComplexPair[] = [[-0.05, 2], [-0.05, -2], [-0.7, 0], [-9, 0]]
const POLES: ComplexPair[] = [[-0.02, 5], [-0.02, -5], [0.4, 0], [-3, 0]]
const GAIN = -0.7

function loop(zeros: ComplexPair[], poles: ComplexPair[], gain: number, rest: Partial<ZerosPolesInput> = {}): LoopAnalysis {
  return analyseLoop({ zeros, poles, gain, ...rest })
}

function expectSame(a: number[], b: number[], digits = 1e-11): void {
  expect(a).toHaveLength(b.length)
  a.forEach((value, i) => expect(Math.abs(value / b[i]! - 1)).toBeLessThan(digits))
}

const inner = (result: LoopAnalysis) => ({
  gain: result.gainCrossovers.map(({ frequency }) => frequency),
  // those at the ends of the axis are no finds
  phase: result.phaseCrossovers.map(({ frequency }) => frequency).filter(f => f !== 0 && f !== result.coverage.to) as number[],
  distance: result.closestApproaches.map(({ frequency }) => frequency),
})

describe('symmetries of the search', () => {
  const base = loop(ZEROS, POLES, GAIN)
  const finds = inner(base)

  it('has something to map', () => {
    expect(base.coverage.proven).toBe(true)
    expect(finds.gain.length + finds.phase.length + finds.distance.length).toBeGreaterThanOrEqual(5)
  })

  it.each([1e-9, 0.37, 2 ** 20, 1e12])('s/%d in place of s scales every frequency and changes nothing else', (scale) => {
    const scaled = loop(ZEROS.map(([re, im]) => [re * scale, im * scale]), POLES.map(([re, im]) => [re * scale, im * scale]), GAIN)
    const mapped = inner(scaled)
    for (const kind of ['gain', 'phase', 'distance'] as const) expectSame(mapped[kind], finds[kind].map(w => w * scale))
    expectSame(scaled.phaseCrossovers.map(({ gainMargin }) => gainMargin), base.phaseCrossovers.map(({ gainMargin }) => gainMargin), 1e-10)
    expect(scaled.vectorMargin!.distance).toBeCloseTo(base.vectorMargin!.distance, 12)
    expect(scaled.stability).toEqual(base.stability)
  })

  it('1/s in place of s turns the axis end for end', () => {
    // closed form: (1/s - r) = -r (s - 1/r)/s, so that roots go to 1/r and the gain takes the product of zeros over that of poles
    const turn = ([re, im]: ComplexPair): ComplexPair => [re / (re * re + im * im), -im / (re * re + im * im)]
    const product = (roots: ComplexPair[]) => roots.reduce((value, [re, im]) => value * (im === 0 ? -re : Math.hypot(re, im)), 1)
    const turned = loop(ZEROS.map(turn), POLES.map(turn), GAIN * product(ZEROS) / product(POLES))
    const mapped = inner(turned)
    for (const kind of ['gain', 'phase', 'distance'] as const) expectSame(mapped[kind], finds[kind].map(w => 1 / w).reverse())
    expect(turned.coverage.proven).toBe(true)
    expect(turned.vectorMargin!.distance).toBeCloseTo(base.vectorMargin!.distance, 12)
  })

  it('the bilinear image in z has its finds at 2 atan(w)/T, and the same verdict', () => {
    // closed form: z = (1 + s)/(1 - s); (s - r) = (z(1 - r) - (1 + r))/(z + 1), and as many zeros as poles cancel the (z + 1)
    const image = ([re, im]: ComplexPair): ComplexPair => {
      const size = (1 - re) * (1 - re) + im * im
      return [(1 - re * re - im * im) / size, 2 * im / size]
    }
    const product = (roots: ComplexPair[]) => roots.reduce((value, [re, im]) => value * (im === 0 ? 1 - re : Math.hypot(1 - re, im)), 1)
    const sampleTime = 0.02
    const sampled = loop(ZEROS.map(image), POLES.map(image), GAIN * product(ZEROS) / product(POLES), { sampleTime })
    const mapped = inner(sampled)
    for (const kind of ['gain', 'phase', 'distance'] as const) expectSame(mapped[kind], finds[kind].map(w => 2 * Math.atan(w) / sampleTime))
    expect(sampled.stability).toEqual(base.stability)
    expect(sampled.coverage.proven).toBe(true)
  })

  it('1/L in place of L keeps the crossings, turns every slope and every gain margin', () => {
    const inverse = loop(POLES, ZEROS, 1 / GAIN)
    const mapped = inner(inverse)
    expectSame(mapped.gain, finds.gain)
    expectSame(mapped.phase, finds.phase)
    inverse.phaseCrossovers.forEach(({ gainMargin, slope }, i) => {
      expect(gainMargin).toBeCloseTo(-base.phaseCrossovers[i]!.gainMargin, 9)
      expect(slope).not.toBe(base.phaseCrossovers[i]!.slope)
    })
  })

  it('hertz in place of rad/s divides frequencies by 2 pi and leaves margins alone', () => {
    const hertz = loop(ZEROS, POLES, GAIN, { frequencyUnit: 'Hz' })
    expectSame(inner(hertz).gain, finds.gain.map(w => w / (2 * Math.PI)))
    expect(hertz.gainCrossovers.map(({ phaseMargin, delayMargin }) => [phaseMargin, delayMargin]))
      .toEqual(base.gainCrossovers.map(({ phaseMargin, delayMargin }) => [phaseMargin, delayMargin]))
  })
})
