import { describe, expect, it } from 'vitest'
import { analyseMeasured } from '#shared/analysis/measured/analyseMeasured'
import { leastDistanceBetween } from '#shared/analysis/measured/leastDistanceBetween'
import { readMeasurement } from '#shared/importers/readMeasurement'
import { previewMeasurement } from '#shared/importers/previewMeasurement'
import { makeSweep } from '#server/demo/makeSweep'
import type { CoverageException, MeasuredInput } from '#shared/types/analysis'
import { type Complex, logSpaced, rational, sampleResponse } from './sampleResponse'

const gapAt = (input: MeasuredInput, frequency: number): CoverageException | undefined =>
  analyseMeasured(input).coverage.exceptions.find(gap => gap.from <= frequency && typeof gap.to === 'number' && gap.to >= frequency)
const atAngle = (size: number, degrees: number): Complex => [size * Math.cos(degrees * Math.PI / 180), size * Math.sin(degrees * Math.PI / 180)]
const through = (...values: Complex[]) => sampleResponse(w => values[w - 1]!, values.map((_, index) => index + 1))

/** 2 / (s + 1) with a mode of damping `zeta` at `w` rad/s: 2 / (s + 1) + strength w^2 / (s^2 + 2 zeta w s + w^2). */
function withMode(w: number, zeta: number, strength: number) {
  return (at: number): Complex => {
    const [a, b] = [rational([2], [1, 1])(at), rational([strength * w * w], [1, 2 * zeta * w, w * w])(at)]
    return [a[0] + b[0], a[1] + b[1]]
  }
}

describe('a gap between samples is not trusted', () => {
  it('when the phase steps by more than 60 deg', () => {
    expect(gapAt(through(atAngle(3, -30), atAngle(3, -95), atAngle(3, -100)), 1.5)).toMatchObject({ from: 1, to: 2, code: 'phaseStep' })
    expect(gapAt(through(atAngle(3, -30), atAngle(3, -85), atAngle(3, -100)), 1.5)).toBeUndefined()
  })

  it('when the magnitude steps by more than 10 dB', () => {
    expect(gapAt(through(atAngle(10, -20), atAngle(3.1, -20), atAngle(3, -20)), 1.5)).toMatchObject({ code: 'magnitudeStep' })
    expect(gapAt(through(atAngle(10, -20), atAngle(3.2, -20), atAngle(3, -20)), 1.5)).toBeUndefined()
  })

  it('when the locus could pass -1 on its other side, though phase and magnitude step little', () => {
    expect(gapAt(through(atAngle(1.05, -160), atAngle(1, -178), atAngle(0.97, -195)), 2.5)).toMatchObject({ code: 'otherSide', leastDistance: 0 })
  })

  it('when a confidence circle beside it holds -1', () => {
    const points = [[-1.3, -0.3], [-1.2, -0.25], [-1.1, -0.2]].map(([re, im], index) => ({ frequency: index + 1, re: re!, im: im!, coherence: 0.6 }))
    // n = 16, coherence 0.6: radius 0.384 |L|, wider than the 0.22 between the last sample and -1.
    expect(gapAt({ measured: { quantity: 'loopGain', points, averages: 16 } }, 2.5)).toMatchObject({ code: 'confidenceCircle', leastDistance: 0 })
  })

  it('when the fit through its neighbours shows a resonance that no sample holds', () => {
    const frequencies = logSpaced(1, 100, 80)
    const between = Math.sqrt(frequencies[39]! * frequencies[40]!)
    // Half power width 0.06 rad/s in a gap of 0.58: a peak of 0.004 / (2 * 0.003) = 0.67, of which the samples show a tenth.
    const gap = gapAt(sampleResponse(withMode(between, 0.003, 0.004), frequencies), between)
    expect(gap).toMatchObject({ code: 'neighbourFit', from: frequencies[39], to: frequencies[40] })
  })

  it('with neighbours of one kind told as one stretch', () => {
    const { coverage } = analyseMeasured(through(...[0, -65, -130, -195, -200].map(degrees => atAngle(5, degrees))))
    expect(coverage.exceptions).toMatchObject([{ from: 1, to: 4, code: 'phaseStep' }])
  })
})

describe('a gap between samples is trusted', () => {
  it('under the gain floor, whatever its steps', () => {
    expect(analyseMeasured({ ...through(atAngle(1e-4, 0), atAngle(1e-4, 120), atAngle(1e-5, -100)) }).coverage.exceptions).toEqual([])
  })

  it('when the resonance is sampled', () => {
    const frequencies = [...logSpaced(1, 100, 80), ...logSpaced(9, 11, 120)].sort((a, b) => a - b)
    expect(analyseMeasured(sampleResponse(withMode(10, 0.003, 0.01), frequencies)).coverage.exceptions).toEqual([])
  })

  it('when the confidence circles of its samples explain the step of phase', () => {
    const input = through(atAngle(0.05, 0), atAngle(0.05, 90), atAngle(0.05, 95))
    const withCoherence = (coherence: number) => ({ measured: { ...input.measured, averages: 16, points: input.measured.points.map(point => ({ ...point, coherence })) } })
    // n = 16: radius 1.35 |L| at coherence 0.1091, 0.157 |L| at 0.9; the samples lie 1.41 |L| apart.
    expect(analyseMeasured(withCoherence(0.1091)).coverage.exceptions).toEqual([])
    expect(analyseMeasured(withCoherence(0.9)).coverage.exceptions).toMatchObject([{ code: 'phaseStep' }])
  })

  it('with noise alone: no fit invents a feature in ten noisy sweeps of a smooth loop', () => {
    const loopGain = rational([4], [1, 1, 0], 0.05)
    const evaluate = (w: number, out: Float64Array) => {
      [out[0], out[1]] = loopGain(w)
      return true
    }
    for (let seed = 1; seed <= 10; seed++) {
      const text = makeSweep({ loop: { evaluate, axisStart: 0, axisEnd: Infinity, features: [], deadTime: 0.05 }, frequencies: logSpaced(0.05, 5, 150), averages: 32, noise: 0.01, seed })
      const { points } = readMeasurement(text, previewMeasurement(text).guess!)
      const { coverage } = analyseMeasured({ frequencyUnit: 'Hz', measured: { quantity: 'loopGain', points, averages: 32 } })
      expect(coverage.exceptions.filter(gap => gap.code === 'neighbourFit')).toEqual([])
    }
  })
})

describe('what a gap may hide', () => {
  it('is bounded by the triangle inequality where nothing steps far: (|1 + A| + |1 + B| - 1.5 |A - B|) / 2', () => {
    expect(leastDistanceBetween(9, 0, 3, 0)).toBeCloseTo((10 + 4 - 1.5 * 6) / 2, 14)
    expect(leastDistanceBetween(-1.1, 0.2, -0.9, -0.2)).toBe(0)
  })

  it('is bounded by a factor of ten in magnitude where phase or magnitude step far', () => {
    expect(gapAt(through([100, 0.001], [30, 0.001], [29, 0.001]), 1.5)).toMatchObject({ code: 'magnitudeStep', leastDistance: expect.closeTo(2, 6) })
    expect(gapAt(through(atAngle(0.05, 0), atAngle(0.05, 90), atAngle(0.05, 95)), 1.5)).toMatchObject({ code: 'phaseStep', leastDistance: expect.closeTo(0.5, 6) })
    expect(gapAt(through(atAngle(0.2, 0), atAngle(0.2, 90), atAngle(0.2, 95)), 1.5)).toMatchObject({ code: 'phaseStep', leastDistance: 0 })
  })

  it('holds for the loop the samples were taken from, on every gap that is told', () => {
    const loopGain = withMode(10, 0.02, 0.1)
    const { coverage } = analyseMeasured(sampleResponse(loopGain, logSpaced(1, 100, 25)))
    expect(coverage.exceptions.length).toBeGreaterThan(0)
    for (const gap of coverage.exceptions) {
      for (const w of logSpaced(gap.from, gap.to as number, 200)) {
        const [re, im] = loopGain(w)
        expect(Math.hypot(1 + re, im)).toBeGreaterThanOrEqual(gap.leastDistance!)
      }
    }
  })
})
