import { describe, expect, it } from 'vitest'
import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'
import { factorsFromRoots } from '#shared/analysis/factors/factorsFromRoots'
import type { ComplexPair } from '#shared/types/analysis'

const failure = (zeros: ComplexPair[], poles: ComplexPair[], gain: number) => {
  try {
    factorsFromRoots(zeros, poles, gain, { deadTime: 0 })
  }
  catch (error) {
    if (error instanceof AnalysisInputError) return error.path
    throw error
  }
  return null
}

describe('factorsFromRoots', () => {
  it('names the complex root that stands without its conjugate', () => {
    expect(failure([], [[-1, 0], [-1, 2], [-1, 2], [-1, -2]], 1)).toBe('poles[2]')
    expect(failure([[0, 1]], [[-1, 0], [-2, 0]], 1)).toBe('zeros[0]')
    expect(failure([], [[-1, 2], [-1, -2.001]], 1)).toBe('poles[0]')
  })

  it('refuses numbers that are not finite, a gain of zero and more zeros than poles', () => {
    expect(failure([], [[-1, 0], [Number.NaN, 0]], 1)).toBe('poles[1]')
    expect(failure([], [[-1, 0]], 0)).toBe('gain')
    expect(failure([], [[-1, 0]], Infinity)).toBe('gain')
    expect(failure([[-1, 0], [-2, 0]], [[-1, 0]], 1)).toBe('zeros')
  })

  it('makes pairs that agree to rounding exactly conjugate', () => {
    const { poles } = factorsFromRoots([], [[-0.1, 1], [-0.1 - 1e-16, -1 - 2e-16]], 1, { deadTime: 0 })
    expect([poles.re[1], poles.im[1]]).toEqual([-0.1, -1])
  })

  it('takes repeated complex pairs in any order', () => {
    const { poles } = factorsFromRoots([], [[-1, 2], [-1, 2], [-1, -2], [-1, -2]], 1, { deadTime: 0 })
    expect(Array.from(poles.im).sort((a, b) => a - b)).toEqual([-2, -2, 2, 2])
  })

  it('puts roots within 1e-9 of the boundary on it, in s and in z', () => {
    const s = factorsFromRoots([], [[0, 0], [-1e-12, 0], [1e-10, 3], [1e-10, -3]], 1, { deadTime: 0 }).poles
    expect(Array.from(s.onBoundary)).toEqual([1, 0, 1, 1])
    expect(s.re[2]).toBe(0)
    const z = factorsFromRoots([], [[1 + 5e-10, 0], [-1, 0], [0, 0], [0.6, 0.8], [0.6, -0.8], [0.999, 0]], 1, { deadTime: 0, sampleTime: 1 }).poles
    expect(Array.from(z.onBoundary)).toEqual([1, 1, 0, 1, 1, 0])
    expect(z.re[0]).toBe(1)
  })
})
