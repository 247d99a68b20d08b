import { describe, expect, it } from 'vitest'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import { readLoopInput } from '#shared/analysis/readLoopInput'
import type { CoefficientsInput, LoopAnalysis, ZerosPolesInput } from '#shared/types/analysis'
import { compareWithOracle } from '../oracle/compareWithOracle'
import type { LOOP_FAMILIES } from '../oracle/generateLoop'
import { generateLoop } from '../oracle/generateLoop'
import { sourceForms } from './sourceForms'

const analyse = (input: unknown) => analyseLoop(readLoopInput(input))

/**
 * One mode: L = K 2 zeta / (s^2 + 2 zeta s + 1). |L| peaks at K / sqrt(1 - zeta^2), at w^2 = 1 - 2 zeta^2, and |L| = 1 where
 * w^2 = 1 - 2 zeta^2 -+ 2 zeta sqrt(K^2 - 1 + zeta^2) (closed form, by the quadratic in w^2).
 */
function mode(zeta: number, peak: number): CoefficientsInput {
  return { numerator: [peak * Math.sqrt((1 - zeta) * (1 + zeta)) * 2 * zeta], denominator: [1, 2 * zeta, 1] }
}

function modeCrossings(zeta: number, hair: number): [number, number] {
  const spread = 2 * zeta * Math.sqrt((1 - zeta * zeta) * hair * (2 + hair))
  return [Math.sqrt(1 - 2 * zeta * zeta - spread), Math.sqrt(1 - 2 * zeta * zeta + spread)]
}

describe('humps that just reach, or just miss, unity gain', () => {
  for (const zeta of [0.5, 1e-2, 1e-5]) {
    for (const hair of [1e-3, 1e-5, 1e-7]) {
      for (const form of ['coefficients', 'zeros-poles-gain', 'expression'] as const) {
        it(`damping ${zeta}: a peak of 1 + ${hair} gives two crossings, one of 1 - ${hair} none (${form}; closed form)`, () => {
          const over = analyse(sourceForms(mode(zeta, 1 + hair))[form])
          const [first, second] = modeCrossings(zeta, hair)
          expect(over.gainCrossovers.map(g => g.slope)).toEqual(['rising', 'falling'])
          // the gain itself is rounded to a double: 2^-53 against the hair moves the crossings by that share of their distance
          const rounding = 4e-16 / hair * (second - first)
          expect(Math.abs(over.gainCrossovers[0]!.frequency - first)).toBeLessThan(1e-9 + rounding)
          expect(Math.abs(over.gainCrossovers[1]!.frequency - second)).toBeLessThan(1e-9 + rounding)
          expect(over.coverage.proven).toBe(true)
          const under = analyse(sourceForms(mode(zeta, 1 - hair))[form])
          expect(under.gainCrossovers).toEqual([])
          expect(under.coverage.proven).toBe(true)
        })
      }
    }
  }

  it('two gain crossovers a relative 1e-6 apart are two (closed form)', () => {
    // distance of the crossings over w: about 2 zeta sqrt(2 hair)
    const zeta = 0.05
    const hair = (1e-6 / (2 * zeta)) ** 2 / 2
    const [first, second] = modeCrossings(zeta, hair)
    expect((second - first) / first).toBeCloseTo(1e-6, 8)
    const { gainCrossovers, coverage } = analyse(mode(zeta, 1 + hair))
    expect(gainCrossovers).toHaveLength(2)
    expect(gainCrossovers[1]!.frequency - gainCrossovers[0]!.frequency).toBeCloseTo(second - first, 8)
    expect(coverage.proven).toBe(true)
  })

  it('two phase crossovers a relative 1e-6 apart are two (closed form)', () => {
    // L = N/s^5 on the axis is -j N/w^5: real where Re N = (x - x1)(x - x2) = 0, x = w^2, and negative there where Im N = w (n1 - n3 x) < 0
    const [x1, x2] = [1, (1 + 1e-6) ** 2]
    const { phaseCrossovers, coverage } = analyse({ numerator: [1, 1, x1 + x2, 0.5, x1 * x2], denominator: [1, 0, 0, 0, 0, 0] })
    expect(phaseCrossovers).toHaveLength(2)
    expect(Math.abs(Number(phaseCrossovers[0]!.frequency) - 1)).toBeLessThan(1e-9)
    expect(Math.abs(Number(phaseCrossovers[1]!.frequency) - 1 - 1e-6)).toBeLessThan(1e-9)
    expect(coverage.exceptions).toEqual([])
  })
})

describe('long dead time', () => {
  it('lists every one of the hundreds of phase crossovers of 2 exp(-2s)/(s+1) above -60 dB (closed form: 2w + atan w = pi (2n + 1))', () => {
    const { phaseCrossovers, coverage } = analyse({ numerator: [2], denominator: [1, 1], deadTime: 2, gainFloor: -60 })
    const last = Math.sqrt(4e6 - 1)
    const count = Math.floor((2 * last + Math.atan(last)) / Math.PI / 2 + 0.5)
    expect(count).toBe(637)
    expect(phaseCrossovers).toHaveLength(count)
    phaseCrossovers.forEach((p, n) => {
      const w = Number(p.frequency)
      expect(Math.abs((2 * w + Math.atan(w)) / Math.PI - (2 * n + 1))).toBeLessThan(1e-9 * w)
      expect(p.gainMargin).toBeCloseTo(10 * Math.log10((1 + w * w) / 4), 6)
    })
    expect(coverage.exceptions).toEqual([])
  })

  it('lists the first 10,000 of more, and tells where the list stops', () => {
    const { phaseCrossovers, coverage } = analyse({ numerator: [2], denominator: [1, 1], deadTime: 200 })
    expect(phaseCrossovers).toHaveLength(10_000)
    const end = Number(phaseCrossovers.at(-1)!.frequency)
    expect(coverage.proven).toBe(false)
    expect(coverage.exceptions.some(e => e.from >= end * (1 - 1e-9))).toBe(true)
    expect((200 * end + Math.atan(end)) / Math.PI).toBeCloseTo(2 * 10_000 - 1, 4)
  })
})

describe('high orders, held against exact arithmetic', () => {
  const compare = (family: typeof LOOP_FAMILIES[number], seed: number, orders: [number, number]) => {
    const { differences, exceptions, setAside } = compareWithOracle(generateLoop(family, seed, orders), analyse)
    expect({ differences, exceptions, setAside }, `${family} ${seed}`).toEqual({ differences: [], exceptions: [], setAside: [] })
  }
  it('order 40, damping from 1e-6, from zeros and poles', () => {
    for (const seed of [1, 2, 3]) compare('light damping', seed, [40, 40])
  })
  it('order 40 over twelve decades', () => {
    for (const seed of [1, 2, 3]) compare('twelve decades', seed, [40, 40])
  })
  it('order 20 from coefficients', () => {
    for (const seed of [1, 2, 3, 4]) compare('coefficients', seed, [20, 20])
  })
  it('order 40 from coefficients', () => {
    for (const seed of [1, 2]) compare('coefficients', seed, [40, 40])
  })
  it('order 24 with dead time', () => {
    for (const seed of [1, 2, 3]) compare('dead time', seed, [24, 24])
  })
  it('order 24, sampled', () => {
    for (const seed of [1, 2, 3]) compare('sampled', seed, [24, 24])
  })
})

describe('each tie is answered with its exception, and the lists leave it out', () => {
  const toldAs = (analysis: LoopAnalysis) => analysis.coverage.exceptions.map(e => [e.from, e.to, e.reason.length > 10])

  it('L real over every frequency: 4/s^2, and an undamped pair alone', () => {
    for (const denominator of [[1, 0, 0], [1, 0, 9]]) {
      const analysis = analyse({ numerator: [4], denominator })
      expect(analysis.phaseCrossovers).toEqual([])
      expect(analysis.gainCrossovers.length).toBeGreaterThan(0)
      expect(analysis.coverage.proven).toBe(false)
      expect(analysis.coverage.exceptions.length).toBeGreaterThan(0)
      expect(analysis.stability.verdict).not.toBe('stable')
      expect(analysis.summary).toBeNull()
    }
  })

  it('|L| = 1 over every frequency: the all-pass (1-s)/(1+s)', () => {
    const analysis = analyse({ numerator: [-1, 1], denominator: [1, 1] })
    expect(analysis.gainCrossovers).toEqual([])
    expect(analysis.coverage.proven).toBe(false)
    expect(toldAs(analysis).length).toBeGreaterThan(0)
    expect(analysis.stability.verdict).not.toBe('stable')
  })

  it('|L| = 1 over every frequency of a sampled loop: 1/z, pure delay of one sample', () => {
    const analysis = analyse({ numerator: [1], denominator: [1, 0], sampleTime: 0.1 })
    expect(analysis.gainCrossovers).toEqual([])
    expect(analysis.coverage.proven).toBe(false)
    expect(analysis.stability.verdict).not.toBe('stable')
  })

  it('L constant, positive and negative', () => {
    for (const gain of [0.5, -0.5]) {
      const analysis = analyse({ numerator: [gain], denominator: [1] })
      expect(analysis.gainCrossovers).toEqual([])
      expect(analysis.closestApproaches).toEqual([])
      expect(analysis.coverage.proven).toBe(false)
      expect(analysis.vectorMargin!.distance).toBeCloseTo(1 + gain, 12)
      expect(analysis.stability.verdict).toBe('stable')
    }
  })

  it('|L| exactly 1 at an end: 1/(s+1) at w = 0, s/(s+1) at infinity', () => {
    for (const numerator of [[1], [1, 0]]) {
      const analysis = analyse({ numerator, denominator: [1, 1] })
      expect(analysis.gainCrossovers).toEqual([])
      expect(analysis.coverage.proven).toBe(false)
      expect(analysis.stability.verdict).toBe('stable')
    }
  })

  it('a biproper loop with dead time whose end gain is above the floor: the crossings up to 10,000 are listed', () => {
    const analysis = analyse({ numerator: [0.5, 0.5], denominator: [1, 2], deadTime: 1 })
    expect(analysis.phaseCrossovers).toHaveLength(10_000)
    expect(analysis.coverage.proven).toBe(false)
    expect(analysis.stability.verdict).toBe('stable')
    expect(analysis.gainCrossovers).toEqual([])
  })

  it('a biproper loop with dead time and |L| above 1 at infinity has no delay to spare', () => {
    const analysis = analyse({ numerator: [2, 1], denominator: [1, 1], deadTime: 1 })
    expect(analysis.stability.verdict).toBe('unstable')
    const without = analyse({ numerator: [2, 1], denominator: [1, 1] })
    expect(without.stability.verdict).toBe('stable')
    expect(without.summary!.delay).toBe(0)
  })

  it('the locus through -1 is marginal, whichever the form', () => {
    for (const input of Object.values(sourceForms({ numerator: [8], denominator: [1, 3, 3, 1] }))) {
      // 8/(s+1)^3 is -1 at sqrt 3 (closed form)
      const analysis = analyse(input)
      expect(analysis.stability.verdict).toBe('marginal')
      expect(analysis.summary).toBeNull()
    }
    expect(analyse({ numerator: [-1], denominator: [1, 1] }).stability.verdict).toBe('marginal')
  })
})

describe('what a reader must be told of the closed loop', () => {
  it('a cancelled unstable pole is counted, and told', () => {
    const loop: ZerosPolesInput = { zeros: [[1, 0]], poles: [[1, 0], [-1, 0], [-2, 0]], gain: 1 }
    const { stability, summary } = analyse(loop)
    expect(stability.verdict).toBe('unstable')
    expect(stability.openLoopUnstablePoles).toBe(1)
    expect(stability.closedLoopUnstablePoles).toBe(1)
    expect(stability.reason).toMatch(/cancel/i)
    expect(summary).toBeNull()
  })
})
