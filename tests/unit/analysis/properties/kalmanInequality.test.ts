import { describe, expect, it } from 'vitest'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import { lqrLoop } from './lqrLoop'

/**
 * R. E. Kalman, When is a linear control system optimal?, J. Basic Engineering 86 (1964): |1 + L| >= 1 at every frequency for a
 * linear quadratic regulator with full state, hence 60 degrees of phase margin and half the gain to lose (M. G. Safonov and M. Athans,
 * Gain and phase margin for multiloop LQG regulators, IEEE Trans. Automatic Control 22, 1977). Continuous time only.
 */
describe('a linear quadratic regulator keeps |1 + L| at 1 or above', () => {
  const plants: [string, number[], number[]][] = [
    ['a double integrator', [1, 0, 0], [4, 1]],
    ['an unstable pole', [1, -1], [9]],
    ['an inverted pendulum on a cart', [1, 0.1, -11, -0.4, 0], [1, 0.5, 30, 2]],
    ['a light mode with an integrator', [1, 0.02, 25, 0], [10, 1, 0.1]],
    ['two light modes', [1, 0.03, 10.0002, 0.12, 9], [3, 0, 5, 0.2]],
    ['an unstable oscillation', [1, -0.4, 4], [2, 2]],
  ]
  for (const [name, characteristic, weights] of plants) {
    it(`for ${name}`, () => {
      const analysis = analyseLoop(lqrLoop(characteristic, weights, 2))
      expect(analysis.stability.verdict).toBe('stable')
      expect(analysis.vectorMargin!.distance).toBeGreaterThan(1 - 1e-9)
      for (const approach of analysis.closestApproaches) expect(approach.distance).toBeGreaterThan(1 - 1e-9)
      expect(analysis.gainCrossovers.length).toBeGreaterThan(0)
      for (const crossing of analysis.gainCrossovers) expect(Math.abs(crossing.phaseMargin)).toBeGreaterThan(60 - 1e-6)
      for (const crossing of analysis.phaseCrossovers) expect(crossing.gainMargin).toBeLessThan(-20 * Math.log10(2) + 1e-6)
    })
  }

  it('is no law in discrete time: the optimal regulator of x+ = 2x + u has |1 + L(-1)| below 1 (scalar Riccati equation p = 4p - 4p^2/(1+p) + q, closed form)', () => {
    // q = 1: p = 4p/(1+p) + 1, p^2 - 4p - 1 = 0, p = 2 + sqrt 5; k = 2p/(1+p); L(z) = k/(z - 2), 1 + L(-1) = 1 - k/3
    const p = 2 + Math.sqrt(5)
    const k = 2 * p / (1 + p)
    const analysis = analyseLoop({ numerator: [k], denominator: [1, -2], sampleTime: 1 })
    expect(analysis.stability.verdict).toBe('stable')
    expect(analysis.vectorMargin!.distance).toBeCloseTo(1 - k / 3, 9)
    expect(analysis.vectorMargin!.frequency).toBeCloseTo(Math.PI, 12)
  })
})
