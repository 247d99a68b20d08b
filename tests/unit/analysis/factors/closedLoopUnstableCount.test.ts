import { describe, expect, it } from 'vitest'
import { closedLoopUnstableCount } from '#shared/analysis/factors/closedLoopUnstableCount'
import { factorsFromCoefficients } from '#shared/analysis/factors/factorsFromCoefficients'
import { factorsFromRoots } from '#shared/analysis/factors/factorsFromRoots'

describe('closedLoopUnstableCount', () => {
  it('has no polynomial with dead time in s, or in z with a part of a sample', () => {
    expect(closedLoopUnstableCount(factorsFromCoefficients([1], [1, 1], { deadTime: 0.1 }))).toBeNull()
    expect(closedLoopUnstableCount(factorsFromCoefficients([1], [1, -0.5], { deadTime: 0.15, sampleTime: 0.1 }))).toBeNull()
  })

  it('has no answer where the degree of denominator plus numerator drops', () => {
    expect(closedLoopUnstableCount(factorsFromCoefficients([-1, 1], [1, 2], { deadTime: 0 }))).toBeNull()
  })

  it('counts the poles of 3(s+6)^2/(s(s+1)^2), a conditionally stable loop: s^3+5s^2+37s+108 has none on the right (Routh: 185 > 108, closed form)', () => {
    const count = closedLoopUnstableCount(factorsFromCoefficients([3, 36, 108], [1, 2, 1, 0], { deadTime: 0 }))
    expect(count).toMatchObject({ count: 0, boundary: 0, certain: true })
  })

  it('counts two on the right for k = 9 in k/(s+1)^3 and two on the axis for k = 8 (closed form: s^3+3s^2+3s+1+k, Routh 9 = 1+k)', () => {
    expect(closedLoopUnstableCount(factorsFromCoefficients([9], [1, 3, 3, 1], { deadTime: 0 }))).toMatchObject({ count: 2, boundary: 0, certain: true })
    expect(closedLoopUnstableCount(factorsFromCoefficients([8], [1, 3, 3, 1], { deadTime: 0 }))).toMatchObject({ count: 0, boundary: 2 })
  })

  it('keeps a cancelled unstable pole (hidden cancellation)', () => {
    const loop = factorsFromRoots([[1, 0]], [[1, 0], [-2, 0], [-3, 0]], 4, { deadTime: 0 })
    expect(closedLoopUnstableCount(loop)).toMatchObject({ count: 1, certain: true })
  })

  it('keeps an integrator cancelled by a zero at 0 as a pole on the boundary', () => {
    const loop = factorsFromRoots([[0, 0]], [[0, 0], [-2, 0]], 4, { deadTime: 0 })
    expect(closedLoopUnstableCount(loop)).toMatchObject({ count: 0, boundary: 1, certain: true })
  })

  it('counts a sampled loop with whole samples of dead time: 0.5/(z-1) with one sample has |z|^2 = 0.5 (closed form z^2-z+0.5)', () => {
    const count = closedLoopUnstableCount(factorsFromCoefficients([0.5], [1, -1], { deadTime: 0.2, sampleTime: 0.2 }))
    expect(count).toMatchObject({ count: 0, boundary: 0, certain: true })
    expect(Math.hypot(count?.poles.re[0] as number, count?.poles.im[0] as number)).toBeCloseTo(Math.SQRT1_2, 14)
    expect(closedLoopUnstableCount(factorsFromCoefficients([1.1], [1, -1], { deadTime: 0.2, sampleTime: 0.2 }))).toMatchObject({ count: 2 })
  })

  it('tells a pole 1e-8 right of the axis from one 1e-8 left of it', () => {
    for (const side of [1, -1]) {
      // s^3 + s^2 + s + (1 + side 2e-8): the pair crosses the axis at 1, its real part is about side * 5e-9 (closed form, first order)
      const loop = factorsFromCoefficients([1 + side * 2e-8], [1, 1, 1, 0], { deadTime: 0 })
      expect(closedLoopUnstableCount(loop)).toMatchObject({ count: side > 0 ? 2 : 0, boundary: 0, certain: true })
    }
  })
})
