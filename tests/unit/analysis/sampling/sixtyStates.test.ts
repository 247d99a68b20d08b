import { describe, expect, it } from 'vitest'
import { rationalPart } from '#shared/analysis/expressions/rationalPart'
import { discretise } from '#shared/analysis/sampling/discretise'
import { exactOf } from './exactOf'
import { exponential, minus, over, plus, times, type Complex } from './complexPairs'
import { equivalentAt, expectClose, zeroOrderKernel } from './expectEquivalent'

/*
 * The discrete equivalent against other routes to the same values on the unit circle: the aliasing sum, sums over modes in closed form, responses integrated step by step.
 */

/** Zero-order equivalent of 1/(s^2 + 2 zeta w s + w^2) at z by its own two poles, in doubles. */
function modeAt(z: Complex, w0: number, zeta: number, T: number): Complex {
  const pole: Complex = [-zeta * w0, w0 * Math.sqrt((1 - zeta) * (1 + zeta))]
  const share = (p: Complex) => over(over([1, 0], times(p, [0, 2 * p[1]])), minus(z, exponential([p[0] * T, p[1] * T])))
  return plus([1 / w0 / w0, 0], times(minus(z, [1, 0]), plus(share(pole), share([pole[0], -pole[1]]))))
}

describe('60 states: two integrators and 29 modes damped by 0.2 % of critical', () => {
  const zeta = 0.002
  const modes = Array.from({ length: 29 }, (_, k) => 100 ** (k / 28))
  const text = `1/s^2+${modes.map(w => `1/(s^2+${2 * zeta * w}*s+${w * w})`).join('+')}`

  for (const T of [0.01, 0.2]) {
    it(`sampled every ${T} s: the sum of the modes' own equivalents, at and between the resonances`, () => {
      const found = equivalentAt(text, { kind: 'hold', hold: 'zeroOrder', sampleTime: T })
      const places = [0.1, 1.7, 12, ...modes.filter(w => w < 0.99 * Math.PI / T), ...modes.map(w => 1.003 * w).filter(w => w < 0.99 * Math.PI / T)]
      for (const w of places) {
        const z = exponential([0, w * T])
        const rigid = over(times([T * T / 2, 0], plus(z, [1, 0])), times(minus(z, [1, 0]), minus(z, [1, 0])))
        const sum = modes.reduce((total, w0) => plus(total, modeAt(z, w0, zeta, T)), rigid)
        expectClose(found(w), sum, 2e-10)
      }
    })
  }

  it('sampled at 10 kHz, where all poles lie within 0.01 of z = 1: the continuous response times hold, aliases being below 1e-9', () => {
    const T = 1e-4
    const found = equivalentAt(text, { kind: 'hold', hold: 'zeroOrder', sampleTime: T })
    for (const w of [0.1, 1, 7.3, 99.9]) {
      const s: Complex = [0, w]
      const plant = modes.reduce<Complex>((sum, w0) => plus(sum, over([1, 0], [(w0 - w) * (w0 + w), 2 * zeta * w0 * w])), over([1, 0], times(s, s)))
      expectClose(found(w), times(zeroOrderKernel(T)(w), plant), 1e-8)
    }
  })

  it('the two integrators lie exactly on z = 1', () => {
    const { poles } = rationalPart(discretise(exactOf(text), { kind: 'hold', hold: 'zeroOrder', sampleTime: 1e-3 }).loop, 1e-3)
    expect(Array.from(poles.re).filter((re, k) => re === 1 && poles.im[k] === 0 && poles.onBoundary[k] === 1)).toHaveLength(2)
  })
})
