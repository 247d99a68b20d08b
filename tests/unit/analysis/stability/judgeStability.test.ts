import { describe, expect, it } from 'vitest'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import type { ComplexPair, Stability, ZerosPolesInput } from '#shared/types/analysis'

function judge(zeros: ComplexPair[], poles: ComplexPair[], gain: number, rest: Partial<ZerosPolesInput> = {}): Stability {
  return analyseLoop({ zeros, poles, gain, ...rest }).stability
}

/** Closed-loop polynomials stand beside each case; their root counts are closed forms or Routh's. */
describe('the closed-loop verdict by counted encirclements', () => {
  it('tells a hidden cancellation of an unstable pole, which the locus cannot show', () => {
    // (s - 1)(s + 1)(s + 3) + 2(s - 1) = (s - 1)(s^2 + 4s + 5)
    const result = judge([[1, 0]], [[1, 0], [-1, 0], [-3, 0]], 2)
    expect(result).toMatchObject({ verdict: 'unstable', openLoopUnstablePoles: 1, closedLoopUnstablePoles: 1 })
    expect(result.reason).toContain('hidden cancellation')
    expect(result.reason).toContain('s = 1')
  })

  it('calls a cancelled integrator marginal: the closed loop keeps it on the boundary', () => {
    const result = judge([[0, 0]], [[0, 0], [-1, 0], [-3, 0]], 2)
    expect(result.verdict).toBe('marginal')
    expect(result.reason).toContain('on the stability boundary')
  })

  it('tells an unstable zero that all but cancels an unstable pole', () => {
    const result = judge([[1 + 1e-10, 0]], [[1, 0], [-1, 0], [-3, 0]], 2)
    expect(result.verdict).toBe('unstable')
    expect(result.reason).toContain('hidden cancellation')
  })

  it('says marginal where L meets -1, before any count', () => {
    // s(s + 1)(s + 2) + 6 = (s + 3)(s^2 + 2)
    expect(judge([], [[0, 0], [-1, 0], [-2, 0]], 6)).toMatchObject({ verdict: 'marginal', encirclements: null, closedLoopUnstablePoles: null })
    expect(judge([], [[0, 0], [-1, 0], [-2, 0]], 5.999999).verdict).toBe('stable')
    expect(judge([], [[0, 0], [-1, 0], [-2, 0]], 6.000001).verdict).toBe('unstable')
  })

  it('needs counter-clockwise encirclements of an open-loop unstable pole', () => {
    // s - 1 + k: stable for k > 1
    expect(judge([], [[1, 0]], 2)).toMatchObject({ verdict: 'stable', openLoopUnstablePoles: 1, encirclements: 1 })
    expect(judge([], [[1, 0]], 0.5)).toMatchObject({ verdict: 'unstable', encirclements: 0, closedLoopUnstablePoles: 1 })
    // (s - 1)(s + 3) + 4(s + 1) = s^2 + 6s + 1
    expect(judge([[-1, 0]], [[1, 0], [-3, 0]], 4)).toMatchObject({ verdict: 'stable', encirclements: 1 })
  })

  it('takes the arcs about one, two and three integrators by the side the phase leaves to', () => {
    // s^2 + k(s + 1): stable; s^2 (s + 1) + k(s + 2): Routh 1 > 2 fails, unstable; s^3 + k(s + 1)^2: stable for k > 1/2
    expect(judge([[-1, 0]], [[0, 0], [0, 0]], 2).verdict).toBe('stable')
    expect(judge([[-2, 0]], [[0, 0], [0, 0], [-1, 0]], 1)).toMatchObject({ verdict: 'unstable', closedLoopUnstablePoles: 2 })
    expect(judge([[-1, 0], [-1, 0]], [[0, 0], [0, 0], [0, 0]], 0.6).verdict).toBe('stable')
    expect(judge([[-1, 0], [-1, 0]], [[0, 0], [0, 0], [0, 0]], 0.4)).toMatchObject({ verdict: 'unstable', closedLoopUnstablePoles: 2 })
    expect(judge([[-1, 0]], [[0, 0]], -2)).toMatchObject({ verdict: 'stable' })
    // s - 2(s + 1) = -s - 2: one root at -2
  })

  it('takes the arcs about undamped poles', () => {
    // s^2 + 1 + k s: stable; (s^2 + 1)(s + 1) + k: s^3 + s^2 + s + 1 + k, Routh 1 > 1 + k fails for k > 0
    expect(judge([[0, 0]], [[0, 1], [0, -1]], 0.5).verdict).toBe('stable')
    expect(judge([], [[0, 1], [0, -1], [-1, 0]], 0.5)).toMatchObject({ verdict: 'unstable', closedLoopUnstablePoles: 2 })
    expect(judge([], [[0, 1], [0, -1], [-1, 0]], -0.5).verdict).toBe('stable')
    expect(judge([[0, 2], [0, -2], [0, 0]], [[0, 1], [0, -1], [0, 3], [0, -3]], 0.5).verdict).toBe('stable')
  })

  it('counts a biproper loop that ends left of -1 at infinity', () => {
    // s + 2 - 3(s + 1) = -2s - 1: root at -1/2; s + 2 - 1.2(s + 3) = -0.2s - 1.6: root at -8; s - 2 - 3(s + 1): -2s - 5, root at -2.5
    expect(judge([[-1, 0]], [[-2, 0]], -3)).toMatchObject({ verdict: 'stable', encirclements: 0 })
    expect(judge([[-3, 0]], [[-2, 0]], -1.2)).toMatchObject({ verdict: 'stable' })
    expect(judge([[-1, 0]], [[2, 0]], -3)).toMatchObject({ verdict: 'stable', encirclements: 1 })
    // s + 2 - 3(s - 1) = -2s + 5: root at 2.5
    expect(judge([[1, 0]], [[-2, 0]], -3)).toMatchObject({ verdict: 'unstable', closedLoopUnstablePoles: 1 })
  })

  it('is stable with a negative phase margin in the list where the count says so', () => {
    // closed form: L = 3s^2/(s^2 + 0.2s + 1) comes from +180 deg at w = 0 and has |L| = 1 below its resonance: a lead of some degrees
    // reaches -1, and yet 4s^2 + 0.2s + 1 is stable
    const result = analyseLoop({ zeros: [[0, 0], [0, 0]], poles: [[-0.1, Math.sqrt(0.99)], [-0.1, -Math.sqrt(0.99)]], gain: 3 })
    expect(result.gainCrossovers.some(({ phaseMargin }) => phaseMargin < 0)).toBe(true)
    expect(result.stability.verdict).toBe('stable')
  })

  it('gives a dead time with a gain above 1 at infinity no chance', () => {
    const result = judge([], [], 2, { deadTime: 1 })
    expect(result).toMatchObject({ verdict: 'unstable', closedLoopUnstablePoles: null })
    expect(result.reason).toContain('endlessly many')
  })

  it('finds the dead time at which a first-order loop goes unstable', () => {
    // closed form: 2/(s + 1) exp(-s d): |L| = 1 at sqrt 3, where the phase is -60 deg - d sqrt 3: unstable from d = 2 pi/(3 sqrt 3) = 1.2092
    expect(judge([], [[-1, 0]], 2, { deadTime: 1.2091 }).verdict).toBe('stable')
    expect(judge([], [[-1, 0]], 2, { deadTime: 1.2093 })).toMatchObject({ verdict: 'unstable', closedLoopUnstablePoles: 2 })
  })

  it('agrees with the roots of the closed loop where a double integrator in z is given', () => {
    // (z - 1)^2 + 0.1(z - 0.9): roots of z^2 - 1.9z + 0.91: product 0.91, stable
    expect(judge([[0.9, 0]], [[1, 0], [1, 0]], 0.1, { sampleTime: 0.01 }).verdict).toBe('stable')
    // (z - 1)^2 + 0.1: |z|^2 = 1.1
    expect(judge([], [[1, 0], [1, 0]], 0.1, { sampleTime: 0.01 })).toMatchObject({ verdict: 'unstable', closedLoopUnstablePoles: 2 })
  })
})
