import { describe, expect, it } from 'vitest'
import { clipPolyline } from '#shared/plots/curves/clipPolyline'
import { curveViews } from '#shared/plots/curves/curveViews'
import { distanceContour } from '#shared/plots/curves/distanceContour'
import { interpolateCurve } from '#shared/plots/curves/interpolateCurve'
import { pathData } from '#shared/plots/curves/pathData'
import { phaseWindow } from '#shared/plots/curves/phaseWindow'
import { stretchesAboveOne } from '#shared/plots/curves/stretchesAboveOne'
import { wrapPhase } from '#shared/plots/curves/wrapPhase'
import { sampleLoopGain } from '#shared/plots/sampling/sampleLoopGain'
import type { GainCrossover } from '#shared/types/analysis'
import { loopGainOfRoots } from './loopGainOfRoots'

const square = { x: 0, y: 0, width: 10, height: 10 }

describe('cutting a line at the edges of a panel', () => {
  it('gives nothing for a line outside, a single point, or none', () => {
    expect(clipPolyline([20, 30], [0, 10], square)).toEqual([])
    expect(clipPolyline([5], [5], square)).toEqual([])
    expect(clipPolyline([], [], square)).toEqual([])
  })
  it('gives one piece for each visit', () => {
    expect(clipPolyline([-5, 5, 5, 15], [5, 5, 20, 20], square)).toEqual([[0, 5, 5, 5, 5, 10]])
    expect(clipPolyline([5, 5, 8, 8], [5, 20, 20, 5], square)).toEqual([[5, 5, 5, 10], [8, 10, 8, 5]])
  })
  it('cuts a chord that passes through with both ends outside', () => {
    expect(clipPolyline([-10, 20], [5, 5], square)).toEqual([[0, 5, 10, 5]])
  })
  it('breaks at a point that is not finite', () => {
    expect(clipPolyline([1, 2, Number.NaN, 3, 4], [1, 1, Number.NaN, 1, 1], square)).toEqual([[1, 1, 2, 1], [3, 1, 4, 1]])
  })
})

describe('path data', () => {
  it('has tenths of a px, no negative zero, and no point twice', () => {
    expect(pathData([[-0.01, 0.04, 0.02, 0.01, 1.26, 2]])).toBe('M0 0L1.3 2')
  })
})

describe('unwrapped phase', () => {
  const start = (gain: number, zeros: [number, number][], poles: [number, number][]) => {
    const views = curveViews(sampleLoopGain(loopGainOfRoots({ gain, zeros, poles }), { from: 0.01, to: 100 }))
    return [views.phase[0]!, views.phase.at(-1)!].map(phase => Math.round(phase))
  }
  // closed form: n integrators turn by -90 n
  it.each([
    ['an integrator', 1, [], [[0, 0]], [-90, -90]],
    ['a double integrator, lag rather than lead', 1, [], [[0, 0], [0, 0]], [-180, -180]],
    ['a triple integrator', 1, [], [[0, 0], [0, 0], [0, 0]], [-270, -270]],
    ['a differentiator', 1, [[0, 0]], [], [90, 90]],
    ['a negative gain', -2, [], [[-1, 0]], [-181, -269]],
    ['an undamped pair, past which the phase falls', 1, [], [[0, 1]], [0, -180]],
    ['undamped zeros, past which it rises', 1, [[0, 1]], [], [0, 180]],
  ] as [string, number, [number, number][], [number, number][], number[]][])('%s', (_, gain, zeros, poles, ends) => {
    expect(start(gain, zeros, poles)).toEqual(ends)
  })
})

describe('the shown range of phase', () => {
  it('has an odd multiple of half a turn in it, even for a flat loop', () => {
    const { from, to } = phaseWindow([Float64Array.of(-2, -1)])
    expect([-180, 180].some(critical => critical > from && critical < to)).toBe(true)
  })
  it('is one wrapped turn where the phase turns often', () => {
    expect(phaseWindow([Float64Array.of(0, -5000)])).toEqual({ from: -360, to: 0, wrapped: true })
  })
  it('does not fail without samples', () => {
    expect(phaseWindow([Float64Array.of()])).toEqual({ from: -270, to: 0, wrapped: false })
  })
  it('cuts a chord across the seam in two', () => {
    const phase = Float64Array.of(-340, -380)
    const wrapped = wrapPhase(Float64Array.of(1, 2), { phase, gain: Float64Array.of(5, 6), distance: Float64Array.of(1, 1) }, { from: -360, to: 0, wrapped: true })
    expect([...wrapped.phase]).toEqual([-340, -380, Number.NaN, 20, -20])
    expect([...wrapped.gain]).toEqual([5, 6, Number.NaN, 5, 6])
  })
})

describe('where the gain is above one', () => {
  const crossing = (frequency: number, slope: 'falling' | 'rising'): GainCrossover => ({ frequency, slope, phaseMargin: 0, delayMargin: 0 })
  it('is told by the caller where nothing crosses', () => {
    expect(stretchesAboveOne([], true)).toEqual([{ from: null, to: null }])
    expect(stretchesAboveOne([], false)).toEqual([])
  })
  it('begins at the low end when the first crossover falls, whatever the caller says', () => {
    expect(stretchesAboveOne([crossing(5, 'falling')], false)).toEqual([{ from: null, to: 5 }])
  })
  it('is an island between a rising and a falling one, and open above a last rising one', () => {
    expect(stretchesAboveOne([crossing(5, 'rising'), crossing(6, 'falling'), crossing(9, 'rising')], false)).toEqual([{ from: 5, to: 6 }, { from: 9, to: null }])
  })
})

describe('reading a curve between its samples', () => {
  const curve = { frequency: Float64Array.of(1, 4), re: Float64Array.of(0, 0), im: Float64Array.of(-4, -1) }
  it('follows log magnitude over log frequency', () => {
    // closed form: L = -4j/w passes -2j at w = 2
    const value = interpolateCurve(curve, 2)!
    expect(value.re).toBeCloseTo(0, 12)
    expect(value.im).toBeCloseTo(-2, 12)
  })
  it('has no value outside, or at a break', () => {
    expect(interpolateCurve(curve, 0.5)).toBeNull()
    expect(interpolateCurve(curve, 5)).toBeNull()
    expect(interpolateCurve({ ...curve, re: Float64Array.of(0, Number.NaN) }, 2)).toBeNull()
  })
})

describe('lines of equal distance to -1 in gain over phase', () => {
  it.each([0.2, 0.5, 0.9])('are at distance %s all around', (distance) => {
    for (const { phase, gain } of distanceContour(distance, -100)) {
      const [size, angle] = [10 ** (gain / 20), (phase - 180) * Math.PI / 180]
      expect(Math.hypot(1 + size * Math.cos(angle), size * Math.sin(angle))).toBeCloseTo(distance, 9)
    }
  })
})
