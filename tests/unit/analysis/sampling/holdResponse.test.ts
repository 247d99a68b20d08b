import { describe, expect, it } from 'vitest'
import { holdResponse } from '#shared/analysis/sampling/holdResponse'
import type { HoldGain } from '#shared/types/block'

function at(hold: HoldGain, w: number): [number, number] {
  const out = new Float64Array(2)
  holdResponse(hold, w, out)
  return [out[0] as number, out[1] as number]
}

/** e^(-jx) summed with equal weights. */
const meanOf = (...angles: number[]): [number, number] => [
  angles.reduce((sum, x) => sum + Math.cos(x), 0) / angles.length,
  angles.reduce((sum, x) => sum - Math.sin(x), 0) / angles.length,
]

function expectClose([re, im]: [number, number], [x, y]: [number, number]) {
  expect(Math.hypot(re - x, im - y)).toBeLessThan(1e-14)
}

describe('the frequency response of a hold', () => {
  const T = 0.1

  it('is one at zero frequency for every kind', () => {
    for (const kind of ['zeroOrder', 'pwmSingleUpdate', 'pwmDoubleUpdate'] as const) {
      expect(at({ kind: 'hold', hold: kind, sampleTime: T, duty: 0.3 }, 0)).toEqual([1, -0])
    }
  })

  it('zero order: (1 - e^(-jwT))/(jwT), and nothing at the sampling frequency', () => {
    for (const w of [1e-6, 1, 31, 55, -7]) {
      const [re, im] = at({ kind: 'hold', hold: 'zeroOrder', sampleTime: T }, w)
      // (1 - cos + j sin)/(j x) = (sin - j (1 - cos))/x
      expectClose([re, im], [Math.sin(w * T) / (w * T), -2 * Math.sin(w * T / 2) ** 2 / (w * T)])
    }
    expectClose(at({ kind: 'hold', hold: 'zeroOrder', sampleTime: T }, 2 * Math.PI / T), [0, 0])
  })

  it('one update a period: the mean of the edges at (1 - D)T/2 and (1 + D)T/2', () => {
    for (const duty of [0, 0.3, 1]) {
      expectClose(at({ kind: 'hold', hold: 'pwmSingleUpdate', sampleTime: T, duty }, 17), meanOf(17 * T * (1 - duty) / 2, 17 * T * (1 + duty) / 2))
    }
  })

  it('one update an edge: the mean of the edges at DT and (1 - D)T; half a sample of pure delay at D = 0.5, the default', () => {
    for (const duty of [0, 0.3, 1]) {
      expectClose(at({ kind: 'hold', hold: 'pwmDoubleUpdate', sampleTime: T, duty }, 17), meanOf(17 * T * duty, 17 * T * (1 - duty)))
    }
    expectClose(at({ kind: 'hold', hold: 'pwmDoubleUpdate', sampleTime: T }, 17), meanOf(17 * T / 2))
  })
})
