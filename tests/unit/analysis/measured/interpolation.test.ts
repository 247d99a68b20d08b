import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { buildMeasuredCurve } from '#shared/analysis/measured/buildMeasuredCurve'
import { curveInGap } from '#shared/analysis/measured/curveAt'
import { evaluateMeasured } from '#shared/analysis/measured/evaluateMeasured'
import { findDistanceMinima } from '#shared/analysis/measured/findDistanceMinima'
import { findLevelCrossings } from '#shared/analysis/measured/findLevelCrossings'
import { fitLocalRational } from '#shared/analysis/measured/fitLocalRational'
import { monotoneSlopes } from '#shared/analysis/measured/monotoneSlopes'
import type { MeasuredInput } from '#shared/types/analysis'
import { logSpaced, over, rational, sampleResponse, times } from './sampleResponse'

describe('monotoneSlopes', () => {
  it('of two samples is their line', () => {
    expect([...monotoneSlopes(Float64Array.of(1, 3), Float64Array.of(2, 8))]).toEqual([3, 3])
  })

  it('is 0 where the data turn or stand still', () => {
    expect([...monotoneSlopes(Float64Array.of(0, 1, 2, 3, 4), Float64Array.of(0, 1, 0, 0, 5))].slice(1, 4)).toEqual([0, 0, 0])
  })

  it('follows a line exactly', () => {
    for (const slope of monotoneSlopes(Float64Array.of(0, 1, 3, 3.5, 7), Float64Array.of(1, -1, -5, -6, -13))) expect(slope).toBeCloseTo(-2, 13)
  })

  it('follows a smooth rise to the fourth order of the spacing', () => {
    const errorAt = (count: number) => {
      const x = Float64Array.from({ length: count }, (_, i) => i / (count - 1))
      const slopes = monotoneSlopes(x, x.map(Math.exp))
      return slopes.subarray(count >> 2, 3 * count >> 2).reduce((worst, slope, i) => Math.max(worst, Math.abs(slope - Math.exp(x[i + (count >> 2)]!))), 0)
    }
    // Halving the spacing divides an error of fourth order by 16, of third order by 8.
    expect(errorAt(41) / errorAt(81)).toBeGreaterThan(12)
  })
})

/** A number on a fine grid that holds neither 0 nor the ends: doubles at random are mostly near 0. */
const spread = (from: number, to: number) => fc.integer({ min: 0, max: 9999 }).map(part => from + (to - from) * (part + 0.5) / 10_000)
const responses = fc.array(fc.record({ step: spread(0, 1), size: spread(-3, 3), angle: spread(-Math.PI, Math.PI) }), { minLength: 2, maxLength: 25 })
  .map((rows): MeasuredInput => {
    let frequency = 1
    const points = rows.map(({ step, size, angle }) => {
      frequency *= Math.exp(step)
      return { frequency, re: Math.exp(size) * Math.cos(angle), im: Math.exp(size) * Math.sin(angle) }
    })
    return { measured: { quantity: 'loopGain', points } }
  })

describe('the interpolant, on arbitrary data', () => {
  it('never leaves the range of the two samples beside it, in gain or in phase', () => {
    fc.assert(fc.property(responses, (input) => {
      const curve = buildMeasuredCurve(input)
      let furthest = 0
      for (let gap = 0; gap + 1 < curve.x.length; gap++) {
        for (let t = 0; t <= 1; t += 0.05) {
          const point = curveInGap(curve, gap, t)
          for (const which of ['gain', 'phase'] as const) {
            const [left, right] = [curve[which][gap]!, curve[which][gap + 1]!]
            furthest = Math.max(furthest, Math.min(left, right) - point[which], point[which] - Math.max(left, right))
          }
        }
      }
      expect(furthest).toBeLessThan(1e-12)
    }), { seed: 1, numRuns: 100 })
  })

  it('has as many gain crossovers as its samples change sides of magnitude 1, falling and rising in turn', () => {
    fc.assert(fc.property(responses, (input) => {
      const curve = buildMeasuredCurve(input)
      const above = Array.from(curve.gain, value => value > 0)
      const changes = above.filter((value, i) => i > 0 && value !== above[i - 1]).length
      const { crossings } = findLevelCrossings(curve, 'gain')
      expect(crossings).toHaveLength(changes)
      crossings.forEach((crossing, i) => {
        if (i > 0) expect([crossing.frequency > crossings[i - 1]!.frequency, crossing.slope !== crossings[i - 1]!.slope]).toEqual([true, true])
        expect(Math.abs(curveInGap(curve, crossing.gap, crossing.t).gain)).toBeLessThan(1e-12)
      })
    }), { seed: 2, numRuns: 200 })
  })

  it('has L real and negative at every phase crossover', () => {
    fc.assert(fc.property(responses, (input) => {
      const curve = buildMeasuredCurve(input)
      for (const { gap, t } of findLevelCrossings(curve, 'phase').crossings) {
        const { phase } = curveInGap(curve, gap, t)
        expect(Math.abs(Math.sin(phase))).toBeLessThan(1e-11)
        expect(Math.cos(phase)).toBeLessThan(0)
      }
    }), { seed: 3, numRuns: 200 })
  })

  it('has a listed minimum of |1 + L| wherever a fine look finds a lower place than both its sides', () => {
    fc.assert(fc.property(responses, (input) => {
      const curve = buildMeasuredCurve(input)
      const look: { x: number, distance: number }[] = []
      for (let gap = 0; gap + 1 < curve.x.length; gap++) {
        for (let i = 0; i < 50; i++) {
          const { gain, phase } = curveInGap(curve, gap, i / 50)
          look.push({ x: curve.x[gap]! + (curve.x[gap + 1]! - curve.x[gap]!) * i / 50, distance: Math.hypot(1 + Math.exp(gain) * Math.cos(phase), Math.exp(gain) * Math.sin(phase)) })
        }
      }
      const minima = findDistanceMinima(curve).map(minimum => Math.log(minimum.frequency))
      const low = look.flatMap((place, i) => i > 0 && i + 1 < look.length && place.distance < Math.min(look[i - 1]!.distance, look[i + 1]!.distance) - 1e-7 ? [i] : [])
      expect(low.filter(i => !minima.some(x => x > look[i - 1]!.x && x < look[i + 1]!.x))).toEqual([])
    }), { seed: 4, numRuns: 100 })
  })
})

describe('evaluateMeasured', () => {
  const loop = evaluateMeasured(sampleResponse(rational([3], [1, 3, 3, 1]), logSpaced(0.1, 10, 60), { frequencyUnit: 'Hz' }))
  const value = new Float64Array(2)

  it('has no value outside the samples', () => {
    expect([loop.axisStart, loop.axisEnd]).toEqual([0.1 * 2 * Math.PI, 20 * Math.PI])
    expect([0, 0.6, 63, Number.NaN].map(w => loop.evaluate(w, value))).toEqual([false, false, false, false])
  })

  it('has its samples at both ends, in rad/s whatever the unit', () => {
    expect(loop.evaluate(loop.axisStart, value)).toBe(true)
    expect(loop.evaluate(loop.axisEnd, value)).toBe(true)
    expect(value[0]).toBeCloseTo(rational([3], [1, 3, 3, 1])(10)[0], 14)
  })

  it('comes close to the loop between its samples', () => {
    loop.evaluate(2 * Math.PI * 1.234, value)
    const [re, im] = rational([3], [1, 3, 3, 1])(1.234)
    expect(Math.hypot(value[0]! - re, value[1]! - im)).toBeLessThan(1e-5)
  })

  it('names the samples at which the magnitude turns', () => {
    const resonant = evaluateMeasured(sampleResponse(rational([1], [1, 0.1, 1]), logSpaced(0.1, 10, 61)))
    expect(resonant.features.map(feature => feature.frequency)).toEqual([expect.closeTo(1, 10)])
  })
})

describe('fitLocalRational', () => {
  const arrays = (loopGain: (w: number) => [number, number], frequencies: number[]) => {
    const values = frequencies.map(loopGain)
    return [Float64Array.from(frequencies), Float64Array.from(values, ([re]) => re), Float64Array.from(values, ([, im]) => im)] as const
  }

  it('fits nothing through fewer than six samples', () => {
    expect(fitLocalRational(...arrays(rational([1], [1, 1]), [1, 2, 3, 4, 5]), 0, 4)).toBeNull()
  })

  it('recovers a resonance between its samples, with its pole, from samples that do not hold its peak', () => {
    // 1 / (jw - p) with p = -0.001 + 10j: pole at w = 10 with half width 0.001, residue 1.
    const loopGain = (w: number) => over([1, 0], [0.001, w - 10])
    const fit = fitLocalRational(...arrays(loopGain, [9.1, 9.3, 9.5, 9.7, 9.9, 10.1, 10.3, 10.5, 10.7, 10.9]), 0, 9)!
    const value = new Float64Array(2)
    fit.evaluate(10, value)
    expect(fit.misfit).toBeLessThan(1e-6)
    expect(value[0]! / 1000).toBeCloseTo(1, 3)
    expect(fit.poles.some(pole => Math.abs(pole.frequency - 10) < 1e-6 && Math.abs(pole.halfWidth - 0.001) < 1e-6) || fit.poles.length === 0).toBe(true)
  })

  it('finds both poles of a pair of features, each with what it adds to L', () => {
    const loopGain = (w: number) => {
      const [a, b] = [over([1, 0], [0.05, w - 9.8]), times([0, 0.5], over([1, 0], [0.02, w - 10.4]))]
      return [a[0] + b[0], a[1] + b[1]] as [number, number]
    }
    const fit = fitLocalRational(...arrays(loopGain, [9.1, 9.3, 9.5, 9.7, 9.9, 10.1, 10.3, 10.5, 10.7, 10.9]), 0, 9)!
    const poles = [...fit.poles].sort((a, b) => a.frequency - b.frequency)
    expect(poles.map(pole => pole.frequency)).toEqual([expect.closeTo(9.8, 5), expect.closeTo(10.4, 5)])
    expect(poles[0]!.contributionAt(9.3)).toBeCloseTo(1 / Math.hypot(0.5, 0.05), 4)
    expect(poles[1]!.contributionAt(10.9)).toBeCloseTo(0.5 / Math.hypot(0.5, 0.02), 4)
  })
})
