import { describe, expect, it } from 'vitest'
import { analyseFactored } from '#shared/analysis/analyseFactored'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import { factorsFromRoots } from '#shared/analysis/factors/factorsFromRoots'
import type { ComplexPair } from '#shared/types/analysis'

describe('loops with very many crossings', () => {
  it('lists the first 10,000, says where the list stops, and still counts the encirclements', () => {
    // closed form: 5/(s + 1) exp(-1000 s): |L| > 1 up to sqrt 24, so turns of w 1000 + atan(w) = pi (2k + 1) below it
    const result = analyseLoop({ zeros: [], poles: [[-1, 0]], gain: 5, deadTime: 1000, gainFloor: -120 })
    const w = Math.sqrt(24)
    const above = Math.floor(((1000 * w + Math.atan(w)) / Math.PI + 1) / 2)
    expect(result.stability).toMatchObject({ encirclements: -2 * above, closedLoopUnstablePoles: 2 * above })
    expect(result.phaseCrossovers).toHaveLength(10_000)
    expect(result.coverage.exceptions.map(({ code }) => code)).toContain('list limit')
    const stop = result.coverage.exceptions.find(({ code, reason }) => code === 'list limit' && reason.includes('phase'))!
    expect(stop.from).toBeCloseTo(result.phaseCrossovers[9_999]!.frequency as number, 12)
  })

  it('finds 100,000 when asked to, none missed', () => {
    const loop = factorsFromRoots([], [[0, 0]] as ComplexPair[], 1, { deadTime: 1000 })
    const result = analyseFactored(loop, { gainFloor: -56 }, { maxListed: 200_000, maxEffort: 2_000_000 })
    // closed form: arg L = -90 deg - 1000 w, |L| = 1/w down to -56 dB
    const last = 10 ** (56 / 20)
    expect(result.phaseCrossovers).toHaveLength(Math.floor((1000 * last - Math.PI / 2) / (2 * Math.PI)) + 1)
    expect(result.phaseCrossovers.length).toBeGreaterThan(100_000)
    expect(result.coverage.proven).toBe(true)
  })

  it('counts a million turns with |L| > 1 in bounded effort', () => {
    const result = analyseLoop({ zeros: [], poles: [[-1, 0]], gain: 1e4, deadTime: 1000 })
    const w = Math.sqrt(1e8 - 1)
    const above = Math.floor(((1000 * w + Math.atan(w)) / Math.PI + 1) / 2)
    expect(result.stability.verdict).toBe('unstable')
    expect(above).toBeGreaterThan(1.5e6)
    expect(result.stability.closedLoopUnstablePoles).toBe(2 * above)
  })

  it('stops with an exception that says where when the effort is used up', () => {
    const loop = factorsFromRoots([], [[0, 0]] as ComplexPair[], 1, { deadTime: 1 })
    const result = analyseFactored(loop, { gainFloor: -100 }, { maxListed: 10_000, maxEffort: 300 })
    const effort = result.coverage.exceptions.find(({ code }) => code === 'effort')!
    expect(effort.from).toBeGreaterThan(1)
    expect(effort.to).toBe('infinity')
    expect(result.coverage.proven).toBe(false)
    expect(result.vectorMargin).toBeNull()
  })
})
