import { describe, expect, it } from 'vitest'
import { analyseMeasured } from '#shared/analysis/measured/analyseMeasured'
import { confidenceRadius } from '#shared/analysis/measured/confidenceRadius'
import { loopGainOf } from '#shared/analysis/measured/loopGainOf'
import { radiusOfLoopGain } from '#shared/analysis/measured/radiusOfLoopGain'
import { logSpaced, rational, sampleResponse } from './sampleResponse'

describe('the 95 % confidence circle of a frequency response', () => {
  it('is not bounded by one average, nor by coherence 0', () => {
    expect([confidenceRadius(0.9, 1), confidenceRadius(0, 100)]).toEqual([Infinity, Infinity])
  })

  it('is a point at coherence 1', () => {
    expect(confidenceRadius(1, 10)).toBe(0)
  })

  // Source: J. S. Bendat, A. G. Piersol, Random Data, ch. 9 (from memory), with F(2, 2n-2; 0.05) = 3.3158295, 3.14525838, 3.05719681, 3.04151825.
  it.each([[16, 0.9, 0.15672173, 9.016664], [32, 0.95, 0.07307528, 4.190641], [75, 0.8, 0.10162858, 5.832959], [100, 0.5, 0.17527808, 10.094841]])(
    'of %d averages at coherence %d has radius %d, a phase half-width of %d deg', (averages, coherence, radius, phase) => {
      expect(confidenceRadius(coherence, averages)).toBeCloseTo(radius, 7)
      expect(Math.asin(confidenceRadius(coherence, averages)) * 180 / Math.PI).toBeCloseTo(phase, 5)
    })
})

describe('the disc about the loop gain', () => {
  it('is not bounded where the measured quantity may be one of infinite loop gain', () => {
    expect([radiusOfLoopGain('sensitivity', 1, 1, 1), radiusOfLoopGain('complementarySensitivity', 0.5, 2, 3)]).toEqual([Infinity, Infinity])
  })

  it.each(['loopGain', 'returnDifference', 'sensitivity', 'complementarySensitivity'] as const)('holds the loop gain for every %s on the circle, and is touched by one', (quantity) => {
    const [re, im, relative] = [0.4, -0.7, 0.3]
    const center = loopGainOf(quantity, re, im)
    const radius = radiusOfLoopGain(quantity, relative, Math.hypot(center.re, center.im), Math.hypot(1 + center.re, center.im))
    const size = relative * Math.hypot(re, im)
    const distances = Array.from({ length: 3600 }, (_, index) => {
      const angle = index * Math.PI / 1800
      const value = loopGainOf(quantity, re + size * Math.cos(angle), im + size * Math.sin(angle))
      return Math.hypot(value.re - center.re, value.im - center.im)
    })
    expect(Math.max(...distances)).toBeLessThanOrEqual(radius * (1 + 1e-12))
    expect(Math.max(...distances)).toBeGreaterThan(radius * (1 - 1e-5))
  })

  it('is carried for each sample in the band, with coherence and averages', () => {
    const input = sampleResponse(rational([3], [1, 3, 3, 1]), logSpaced(0.1, 10, 21), { coherence: 0.9, averages: 16, band: [0.5, 5] })
    const { discs, samples } = analyseMeasured(input)
    expect(discs).toHaveLength(samples!)
    for (const disc of discs!) expect(disc.radius).toBeCloseTo(0.15672173 * Math.hypot(disc.re, disc.im), 7)
  })

  it('is not made up where the coherence of a sample or the averages are missing', () => {
    const input = sampleResponse(rational([1], [1, 1]), [1, 2, 3], { coherence: 0.9 })
    expect(analyseMeasured(input).discs).toBeUndefined()
    delete input.measured.points[1]!.coherence
    expect(analyseMeasured({ ...input, measured: { ...input.measured, averages: 16 } }).discs).toBeUndefined()
  })

  it('marks a dip no deeper than it is wide as perhaps noise', () => {
    const sizes = [0.5, 0.499, 0.5, 0.2, 0.5]
    const { closestApproaches } = analyseMeasured(sampleResponse(w => [sizes[w - 1]! - 1, 0.001], [1, 2, 3, 4, 5], { coherence: 0.999, averages: 100 }))
    expect(closestApproaches.map(approach => [Math.round(approach.frequency), approach.withinNoise ?? false])).toEqual([[2, true], [4, false]])
  })
})

describe('loopGainOf', () => {
  // L = 1/S - 1 = T/(1 - T): derived from S + T = 1.
  it('keeps the digits of a small loop gain in a sensitivity near 1', () => {
    expect(loopGainOf('sensitivity', 1 - 2 ** -40, 0).re).toBeCloseTo(2 ** -40 / (1 - 2 ** -40), 24)
  })

  it('inverts each quantity', () => {
    const loopGain = { re: -0.3, im: 0.8 }
    const size = 0.7 ** 2 + 0.8 ** 2
    const sensitivity = { re: 0.7 / size, im: -0.8 / size }
    expect(loopGainOf('sensitivity', sensitivity.re, sensitivity.im)).toEqual({ re: expect.closeTo(loopGain.re, 14), im: expect.closeTo(loopGain.im, 14) })
    expect(loopGainOf('complementarySensitivity', 1 - sensitivity.re, -sensitivity.im)).toEqual({ re: expect.closeTo(loopGain.re, 14), im: expect.closeTo(loopGain.im, 14) })
    expect(loopGainOf('returnDifference', 0.7, 0.8)).toEqual({ re: expect.closeTo(-0.3, 14), im: 0.8 })
  })
})
