import { describe, expect, it } from 'vitest'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import { impliedMargins } from '#shared/analysis/margins/impliedMargins'
import { wrapDegrees } from '#shared/analysis/margins/wrapDegrees'
import type { ComplexPair, LoopAnalysis, ZerosPolesInput } from '#shared/types/analysis'

function loop(zeros: ComplexPair[], poles: ComplexPair[], gain: number, rest: Partial<ZerosPolesInput> = {}): LoopAnalysis {
  return analyseLoop({ zeros, poles, gain, ...rest })
}

describe('margins and peaks', () => {
  it('reads what a vector margin implies', () => {
    // common practice, no source: 0.5 implies a factor of 2 and 2 asin(1/4) = 28.955 deg
    const implied = impliedMargins(0.5)
    expect(implied.impliedGainIncrease).toBeCloseTo(20 * Math.log10(2), 12)
    expect(implied.impliedGainDecrease).toBeCloseTo(20 * Math.log10(2 / 3), 12)
    expect(implied.impliedPhase).toBeCloseTo(28.95502437185985, 11)
    expect(impliedMargins(1).impliedGainIncrease).toBeNull()
  })

  it('wraps angles into (-180, 180]', () => {
    expect([-180, 180, 540, -190, 0, -360].map(wrapDegrees)).toEqual([180, 180, 180, 170, 0, 0])
  })

  it('finds the resonance peak of T of a second-order closed loop', () => {
    // closed form: T = 1/(s^2 + 2 z s + 1) from L = 1/(s(s + 2z)) peaks at 1/(2 z sqrt(1 - z^2))
    const z = 0.1
    const result = loop([], [[0, 0], [-2 * z, 0]], 1)
    expect(result.summary!.complementarySensitivityPeak).toBeCloseTo(1 / (2 * z * Math.sqrt(1 - z * z)), 10)
    expect(result.summary!.sensitivityPeak).toBeCloseTo(1 / result.vectorMargin!.distance, 14)
  })

  it('takes T = 1 at zero frequency for the peak of a loop without resonance', () => {
    // closed form: L = 1/s, T = 1/(s + 1)
    expect(loop([], [[0, 0]], 1).summary!.complementarySensitivityPeak).toBeCloseTo(1, 14)
  })

  it('has a disk margin of 2 for 1/s, whose S - 1/2 is all-pass', () => {
    // closed form: S - 1/2 = (s - 1)/(2(s + 1)), |.| = 1/2
    const disk = loop([], [[0, 0]], 1).diskMargin!
    expect(disk.alpha).toBeCloseTo(2, 12)
    expect(disk.phase).toBeCloseTo(90, 10)
  })

  it('has the disk margin of a textbook loop', () => {
    // Seiler, Packard, Gahinet 2020, example L = 25/(s^3 + 10 s^2 + 10 s + 10): alpha = 0.46, from memory; the exact value by
    // its definition on a fine grid below, as a lower bound of the search
    const result = analyseLoop({ numerator: [25], denominator: [1, 10, 10, 10] })
    expect(result.diskMargin!.alpha).toBeCloseTo(0.46, 2)
    let least = Number.POSITIVE_INFINITY
    for (let i = 0; i <= 200_000; i++) {
      const w = 10 ** (-1 + 3 * i / 200_000)
      const re = 10 - 10 * w * w
      const im = 10 * w - w * w * w
      const size = re * re + im * im
      const lRe = 25 * re / size
      const lIm = -25 * im / size
      least = Math.min(least, 2 * Math.hypot(1 + lRe, lIm) / Math.hypot(1 - lRe, lIm))
    }
    expect(result.diskMargin!.alpha).toBeLessThanOrEqual(least)
    expect(result.diskMargin!.alpha).toBeCloseTo(least, 8)
  })

  it('takes a simultaneous change of gain and phase that brings each closest approach to -1', () => {
    const result = loop([], [[0, 0], [-1, 0], [-3, 0]], 5)
    expect(result.closestApproaches).toHaveLength(1)
    const { frequency: w, gainChange, phaseChange } = result.closestApproaches[0]!
    // closed form of L, then changed
    const size = 5 / (w * Math.hypot(w, 1) * Math.hypot(w, 3)) * 10 ** (gainChange / 20)
    const phase = -Math.PI / 2 - Math.atan(w) - Math.atan(w / 3) + phaseChange * Math.PI / 180
    expect(size * Math.cos(phase)).toBeCloseTo(-1, 11)
    expect(size * Math.sin(phase)).toBeCloseTo(0, 11)
    expect(phaseChange).toBeLessThan(0)
  })

  it('finds a least |1 + L| that lies where |L| is far under the gain floor', () => {
    // closed form: L = k/(s + 1)^2 has Re L < 0 from w = 1 on; |1 + L|^2 - 1 = k(2 - 2w^2 + k)/(1 + w^2)^2, least at w^2 = 3 + k
    const k = 1e-5
    const result = loop([], [[-1, 0], [-1, 0]], k)
    expect(result.closestApproaches).toEqual([])
    expect(result.vectorMargin!.frequency).toBeCloseTo(Math.sqrt(3 + k), 7)
    expect(result.vectorMargin!.distance).toBeCloseTo(Math.sqrt(1 + k * (2 - 2 * (3 + k) + k) / (4 + k) ** 2), 12)
  })

  it('takes the ends of a band into the vector margin', () => {
    const whole = loop([], [[-1, 0], [-1, 0], [-1, 0]], 3)
    const part = loop([], [[-1, 0], [-1, 0], [-1, 0]], 3, { band: [2, 50] })
    expect(whole.vectorMargin!.frequency).toBeLessThan(2)
    expect(part.vectorMargin!.frequency).toBe(2)
    expect(part.gainCrossovers).toEqual([])
    expect(part.stability.verdict).toBe('stable')
    expect(part.coverage).toMatchObject({ from: 2, to: 50, proven: true })
  })

  it('allows a biproper loop with |L| > 1 at infinity no delay at all', () => {
    // closed form: 3(s + 1)/(s + 2): 4s + 5, stable
    expect(loop([[-1, 0]], [[-2, 0]], 3).summary!.delay).toBe(0)
  })

  it('gives the delay margin of each crossover by the lag that reaches -1 first', () => {
    // closed form: 2/(s - 1): |L| = 1 at sqrt 3, arg L = -180 + 60 deg: lag 60 deg
    const [crossover] = loop([], [[1, 0]], 2).gainCrossovers
    expect(crossover!.phaseMargin).toBeCloseTo(60, 10)
    expect(crossover!.delayMargin).toBeCloseTo(Math.PI / 3 / Math.sqrt(3), 12)
    // -1/2 ... a lead: 4/(s^2(s + 1)) needs 180 + arg L = -atan(w) lead, so 360 less of lag
    const [lead] = loop([], [[0, 0], [0, 0], [-1, 0]], 4).gainCrossovers
    expect(lead!.phaseMargin).toBeCloseTo(-Math.atan(lead!.frequency) * 180 / Math.PI, 9)
    expect(lead!.delayMargin).toBeCloseTo((2 * Math.PI - Math.atan(lead!.frequency)) / lead!.frequency, 10)
  })
})
