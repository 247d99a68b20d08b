import { describe, expect, it } from 'vitest'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import { prepareLoopGain } from '#shared/analysis/prepareLoopGain'
import type { CoefficientsInput } from '#shared/types/analysis'
import { integrateUnitInterval } from './integrateOnAxis'

/** ln |S| at w from the engine's own evaluation. */
function logSensitivity(input: CoefficientsInput) {
  const loop = prepareLoopGain(input)
  const value = new Float64Array(2)
  return (w: number) => {
    expect(loop.evaluate(w, value)).toBe(true)
    // 1 + L may be far above the double range's square: hypot does not overflow
    return -Math.log(Math.hypot(1 + value[0]!, value[1]!))
  }
}

/** Over w from 0 to infinity, w = t/(1 - t). */
function overContinuousAxis(input: CoefficientsInput): number {
  const f = logSensitivity(input)
  return integrateUnitInterval((t, rest) => rest < 1e-7 ? 0 : f(t / rest) / rest ** 2)
}

/**
 * H. W. Bode, Network Analysis and Feedback Amplifier Design (1945); J. S. Freudenberg and D. P. Looze, IEEE Trans. Automatic Control 30 (1985): for a stable closed
 * loop the integral of ln |S| over w is pi times the sum of the real parts of the unstable poles of L (relative degree 2 or more), less (pi/2) lim s L(s) for
 * relative degree 1. Cut off at w = 1e7: the rest is below 1e-6.
 */
describe('Bode\'s integral in continuous time', () => {
  const cases: [string, CoefficientsInput, number][] = [
    ['4/((s-1)(s+3)): pi', { numerator: [4], denominator: [1, 2, -3] }, Math.PI],
    ['3/(s+1)^3: 0', { numerator: [3], denominator: [1, 3, 3, 1] }, 0],
    ['(sqrt 2 s + 1)/s^2: -pi/sqrt 2', { numerator: [Math.SQRT2, 1], denominator: [1, 0, 0] }, -Math.PI / Math.SQRT2],
    ['2/(s-1): 0, pi of the pole less pi of the slope', { numerator: [2], denominator: [1, -1] }, 0],
  ]
  for (const [name, input, value] of cases) {
    it(`is as published for ${name}`, () => {
      expect(analyseLoop(input).stability.verdict).toBe('stable')
      expect(Math.abs(overContinuousAxis(input) - value)).toBeLessThan(2e-6)
    })
  }
})

/** H.-K. Sung and S. Hara, Int. J. Control 48 (1988): pi times the sum of ln |p| of the poles outside the unit circle, for a strictly proper loop. */
describe('Bode\'s integral in discrete time', () => {
  const cases: [string, CoefficientsInput, number][] = [
    ['1.5/(z-2): pi ln 2', { numerator: [1.5], denominator: [1, -2], sampleTime: 1 }, Math.PI * Math.LN2],
    ['0.25/((z-1)(z-0.5)): 0', { numerator: [0.25], denominator: [1, -1.5, 0.5], sampleTime: 1 }, 0],
  ]
  for (const [name, input, value] of cases) {
    it(`is as published for ${name}`, () => {
      expect(analyseLoop(input).stability.verdict).toBe('stable')
      const f = logSensitivity(input)
      const integral = integrateUnitInterval((t, rest) => t < 1e-9 || rest < 1e-9 ? 0 : Math.PI * f(Math.PI * t))
      expect(Math.abs(integral - value)).toBeLessThan(1e-6)
    })
  }
})
