import { describe, expect, it } from 'vitest'
import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'
import { factorsFromCoefficients } from '#shared/analysis/factors/factorsFromCoefficients'
import type { FactorList } from '#shared/analysis/FactoredLoop'
import { newtonTruth } from './newtonTruth'
import { expand, random } from './polynomials'

const failure = (numerator: number[], denominator: number[], options = { deadTime: 0 }) => {
  try {
    factorsFromCoefficients(numerator, denominator, options)
  }
  catch (error) {
    if (error instanceof AnalysisInputError) return { path: error.path, message: error.message }
    throw error
  }
  return null
}

const rootsOf = (list: FactorList) => Array.from(list.re, (re, k) => [re, list.im[k] as number, list.onBoundary[k] as number])

describe('factorsFromCoefficients', () => {
  it('refuses an empty list, a zero list and a number that is not finite, naming the place', () => {
    expect(failure([], [1])?.path).toBe('numerator')
    expect(failure([1], [])?.path).toBe('denominator')
    expect(failure([0, 0], [1, 1])?.path).toBe('numerator')
    expect(failure([1], [0, 0, 0])?.path).toBe('denominator')
    expect(failure([1], [1, Number.NaN, 2])?.path).toBe('denominator[1]')
    expect(failure([1, Infinity], [1, 2, 3])?.path).toBe('numerator[1]')
  })

  it('refuses a loop gain that grows without bound, with dead time or not, and one in z that needs future samples', () => {
    expect(failure([1, 0, 0], [1, 1])?.message).toContain('grows without bound')
    expect(failure([1, 0, 0], [1, 1], { deadTime: 0.1 })?.message).toContain('grows without bound')
    expect(failure([1, 0, 0], [1, 1], { deadTime: 0, ...{ sampleTime: 0.1 } })?.message).toContain('future samples')
  })

  it('drops leading zeros and takes trailing zeros as roots exactly at 0', () => {
    const loop = factorsFromCoefficients([0, 0, 3], [0, 2, 4, 0, 0], { deadTime: 0 })
    expect(loop.gain).toBe(1.5)
    expect(rootsOf(loop.poles)).toEqual([[0, 0, 1], [0, 0, 1], [-2, 0, 0]])
  })

  it('finds a root of exact multiplicity twenty to the last bit', () => {
    let denominator = [1]
    for (let k = 0; k < 20; k++) denominator = expand(denominator, [1, 1])
    const { poles } = factorsFromCoefficients([1], denominator, { deadTime: 0 })
    expect(rootsOf(poles)).toEqual(Array.from({ length: 20 }, () => [-1, 0, 0]))
  })

  it('gives both parts of every root to the last digits: orders 4 to 40, damping to 1e-5, up to twelve decades, against 1200-bit Newton', () => {
    const next = random(7)
    for (const [order, decades, damping] of [[4, 2, 1e-5], [12, 3, 1e-5], [24, 3, 1e-4], [40, 12, 1e-5]] as const) {
      let denominator = [1]
      for (let k = 0; k < order; k += 2) {
        const w = 10 ** (decades * (next() - 0.5))
        const zeta = damping ** next()
        denominator = expand(denominator, [1, 2 * zeta * w, w * w])
      }
      const { poles } = factorsFromCoefficients([1], denominator, { deadTime: 0 })
      for (let k = 0; k < order; k++) {
        const truth = newtonTruth(denominator, poles.re[k] as number, poles.im[k] as number)
        expect(Math.abs(truth.re)).toBeLessThan(4e-15 * Math.abs(poles.re[k] as number))
        expect(Math.abs(truth.im)).toBeLessThan(4e-16 * Math.abs(poles.im[k] as number))
        // the correction covers the distance to the true root
        expect(poles.correction[k] as number).toBeGreaterThan(0.9 * Math.hypot(truth.re, truth.im))
        expect(poles.correction[k] as number).toBeLessThan(3e-16 * Math.hypot(poles.re[k] as number, poles.im[k] as number))
      }
    }
  })

  it('tells clustered roots apart that rounding of the coefficients has split', () => {
    // (s^2 + 0.4 s + 1.1)^6 in doubles: six pairs about 1e-2 apart, each a simple root of the rounded polynomial
    let denominator = [1]
    for (let k = 0; k < 6; k++) denominator = expand(denominator, [1, 0.4, 1.1])
    const { poles } = factorsFromCoefficients([1], denominator, { deadTime: 0 })
    for (let k = 0; k < 12; k++) {
      const truth = newtonTruth(denominator, poles.re[k] as number, poles.im[k] as number)
      expect(Math.hypot(truth.re, truth.im)).toBeLessThan(4e-16)
    }
  })

  it('puts a double and a triple integrator in z from rounded coefficients exactly on z = 1', () => {
    for (const m of [2, 3, 4]) {
      let denominator = [1, -0.37]
      for (let k = 0; k < m; k++) denominator = expand(denominator, [1, -1])
      const { poles } = factorsFromCoefficients([1], denominator, { deadTime: 0, sampleTime: 0.1 })
      expect(rootsOf(poles).filter(root => root[2] === 1)).toEqual(Array.from({ length: m }, () => [1, 0, 1]))
    }
  })

  it('leaves three poles close to z = 1 of a fast sampled loop where they are', () => {
    let denominator = [1]
    for (const pole of [0.99, 0.995, 0.999]) denominator = expand(denominator, [1, -pole])
    const { poles } = factorsFromCoefficients([1], denominator, { deadTime: 0, sampleTime: 0.001 })
    expect(rootsOf(poles).filter(root => root[2] === 1)).toEqual([])
  })

  it('puts two equal undamped pairs from rounded coefficients exactly on the axis, and on the unit circle', () => {
    const mode = expand(expand([1, 0, 0.7], [1, 0, 0.7]), [1, 0.3])
    const axis = factorsFromCoefficients([1], mode, { deadTime: 0 }).poles
    expect(rootsOf(axis).filter(root => root[2] === 1).map(root => [root[0], Math.abs(root[1] as number)]))
      .toEqual(Array.from({ length: 4 }, () => [0, Math.sqrt(0.7)]))
    const c = Math.cos(0.3)
    const sampled = expand(expand([1, -2 * c, 1], [1, -2 * c, 1]), [1, 0.3])
    const circle = factorsFromCoefficients([1], sampled, { deadTime: 0, sampleTime: 1 }).poles
    const on = rootsOf(circle).filter(root => root[2] === 1)
    expect(on).toHaveLength(4)
    for (const [re, im] of on) expect(Math.hypot(re as number, im as number)).toBeCloseTo(1, 15)
  })

  it('takes a damping of 1e-8 as damping and one of 1e-10 as none', () => {
    const light = factorsFromCoefficients([1], [1, 2e-8, 1], { deadTime: 0 }).poles
    expect(rootsOf(light).map(root => root[2])).toEqual([0, 0])
    const undamped = factorsFromCoefficients([1], [1, 2e-10, 1], { deadTime: 0 }).poles
    expect(rootsOf(undamped).map(root => [root[0], root[2]])).toEqual([[0, 1], [0, 1]])
  })

  it('takes ten equal pairs with damping 0.01 as on the axis: their rounded coefficients cannot tell (some come out in the right half plane)', () => {
    let denominator = [1]
    for (let k = 0; k < 10; k++) denominator = expand(denominator, [1, 0.02, 1])
    const { poles } = factorsFromCoefficients([1], denominator, { deadTime: 0 })
    expect(Array.from(poles.re)).toEqual(new Array(20).fill(0))
  })

  it('takes a slow real pole as slow, not as an integrator', () => {
    const { poles } = factorsFromCoefficients([1], [1, 1, 1e-12], { deadTime: 0 })
    expect(Array.from(poles.onBoundary)).toEqual([0, 0])
    expect(Math.max(...poles.re)).toBeCloseTo(-1e-12, 22)
  })
})
