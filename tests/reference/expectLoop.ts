import { expect } from 'vitest'
import type { LoopAnalysis } from '#shared/types/analysis'
import type { CheckLoop } from './checkLoop'

/** The computed values are given to 12 digits (frequencies, distances) and 10 digits (margins). */
function expectFrequency(found: number | 'infinity', expected: number) {
  expect(found).not.toBe('infinity')
  expect(Math.abs(Number(found) / expected - 1)).toBeLessThan(1e-9)
}

export function expectCrossings(analysis: LoopAnalysis, loop: CheckLoop, gainFloor: number) {
  const { expected } = loop
  expect(analysis.gainCrossovers.map(g => g.frequency.toPrecision(6))).toEqual(expected.gain_crossovers.map(([w]) => w.toPrecision(6)))
  analysis.gainCrossovers.forEach((crossing, i) => {
    const [w, phaseMargin] = expected.gain_crossovers[i]!
    expectFrequency(crossing.frequency, w)
    expect(Math.abs(crossing.phaseMargin - phaseMargin)).toBeLessThan(1e-6)
    const delay = expected.delay_margins_s[i]![1]
    expect(Math.abs(crossing.delayMargin - delay)).toBeLessThan(2e-9 * delay + 2e-8 / w)
  })
  const inside = expected.phase_crossovers.filter(([, gainMargin]) => gainMargin < -gainFloor)
  const ends: [number | 'infinity', number][] = [
    ...expected.dc?.gm_db === undefined ? [] : [[0, expected.dc.gm_db] as [number, number]],
    ...inside,
    ...expected.infinity?.gm_db === undefined ? [] : [['infinity', expected.infinity.gm_db] as ['infinity', number]],
  ]
  const found = expected.phase_crossovers_truncated ? analysis.phaseCrossovers.slice(0, ends.length) : analysis.phaseCrossovers
  expect(found.map(p => p.frequency === 'infinity' ? p.frequency : p.frequency.toPrecision(6))).toEqual(ends.map(([w]) => w === 'infinity' ? w : w.toPrecision(6)))
  found.forEach((crossing, i) => {
    const [w, gainMargin] = ends[i]!
    if (w !== 'infinity' && w > 0) expectFrequency(crossing.frequency, w)
    expect(Math.abs(crossing.gainMargin - gainMargin)).toBeLessThan(1e-6)
  })
}

export function expectDistances(analysis: LoopAnalysis, loop: CheckLoop) {
  const { expected } = loop
  expect(analysis.vectorMargin).not.toBeNull()
  expect(Math.abs(analysis.vectorMargin!.distance - expected.vector_margin[1])).toBeLessThan(2e-12 + 1e-9 * expected.vector_margin[1])
  if (analysis.summary) {
    expect(Math.abs(analysis.summary.sensitivityPeak / Number(expected.Ms) - 1)).toBeLessThan(1e-9)
    // the listed peak of |T| of two loops was taken beside its true place, w = 0, where T is 1
    const peak = loop.id === 'dt-int-k0.5' ? 1 : expected.Mt![1]
    expect(Math.abs(analysis.summary.complementarySensitivityPeak / peak - 1)).toBeLessThan(2e-9)
  }
}

export function expectVerdict(analysis: LoopAnalysis, loop: CheckLoop) {
  const { expected } = loop
  if (expected.marginal) {
    expect(analysis.stability.verdict).toBe('marginal')
    expect(analysis.summary).toBeNull()
    return
  }
  expect([analysis.stability.verdict, analysis.stability.reason]).toEqual([expected.closed_loop_stable ? 'stable' : 'unstable', analysis.stability.reason])
  expect(analysis.stability.openLoopUnstablePoles).toBe(expected.open_loop_rhp_poles)
  expect(analysis.stability.closedLoopUnstablePoles).toBe(expected.closed_loop_unstable_poles)
  expect(analysis.stability.encirclements).toBe(expected.open_loop_rhp_poles - expected.closed_loop_unstable_poles)
  expect(analysis.summary === null).toBe(!expected.closed_loop_stable)
}

/** Loops that are ties of the contract by their nature: each must be answered, with its exception. */
export const TIES: Record<string, string> = {
  'sp-2.2-P2.5': 'the locus meets -1 exactly',
  'lqr-1st-unstable': '|1 + L| is 1 at every frequency',
  'ds81-L2': '|L(0)| is exactly 1',
  'aw-2nd-rounded': '|L| is 1 to rounding at w = 0 (0.121/0.121)',
  'aw-2nd-exact': '|L| is 1 to rounding at w = 0',
  'allpass-0.5': '|L| is 0.5 at every frequency: no gain crossover, and nothing else changes',
}
