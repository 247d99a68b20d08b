import { describe, expect, it } from 'vitest'
import { makeSweep } from '#server/demo/makeSweep'
import type { LoopGain } from '#shared/analysis/LoopGain'
import { previewMeasurement } from '#shared/importers/previewMeasurement'
import { readMeasurement } from '#shared/importers/readMeasurement'

/** L = 20 / (s (s + 5)). */
const loop: LoopGain = {
  evaluate: (w, out) => {
    const size = -20 / (w * (w * w + 25))
    out[0] = size * w
    out[1] = size * 5
    return w > 0
  },
  axisStart: 0, axisEnd: Infinity, features: [], deadTime: 0,
}
const frequencies = Array.from({ length: 200 }, (_, index) => 0.05 * 400 ** (index / 199))
const sweep = (change: object = {}) => makeSweep({ loop, frequencies, averages: 32, noise: 0.02, seed: 7, ...change })

describe('makeSweep', () => {
  it('refuses a frequency at which the loop gain has no value', () => {
    expect(() => sweep({ frequencies: [0, 1] })).toThrow('no value at 0 Hz')
  })

  it('gives the same text for the same seed and another for another', () => {
    expect(sweep()).toBe(sweep())
    expect(sweep({ seed: 8 })).not.toBe(sweep())
  })

  it('states how it was made in comment lines', () => {
    expect(previewMeasurement(sweep()).comments.join(' ')).toMatch(/Invented data.*32 averages.*noise.*0\.02.*seed 7/)
  })

  it('is read back by the importer with the mapping it guesses', () => {
    const { guess } = previewMeasurement(sweep())
    expect(guess).toEqual({ frequencyColumn: 0, frequencyUnit: 'Hz', form: 'dB and degrees', firstColumn: 1, secondColumn: 2, coherenceColumn: 3, quantity: 'loopGain' })
    const { points, problems } = readMeasurement(sweep(), guess!)
    expect([points.length, problems]).toEqual([200, []])
  })

  it('without noise is the loop gain to the digits written, with coherence 1', () => {
    const { points } = readMeasurement(sweep({ noise: 0 }), previewMeasurement(sweep()).guess!)
    const value = new Float64Array(2)
    for (const point of points) {
      loop.evaluate(2 * Math.PI * point.frequency, value)
      const size = Math.hypot(value[0]!, value[1]!)
      expect(Math.hypot(point.re - value[0]!, point.im - value[1]!) / size).toBeLessThan(2e-5)
      expect(point.coherence).toBe(1)
    }
  })

  it('scatters as the coherence and the averages say: relative variance (1 - g2) / (n g2) of the complex error', () => {
    // Twice the square of eps = sqrt((1 - g2) / (2 n g2)) of gain and of phase: Bendat and Piersol, Random Data, ch. 9.
    const { points } = readMeasurement(sweep({ frequencies: frequencies.map((_, index) => 1 + index * 1e-5), noise: 0.3, averages: 64 }), previewMeasurement(sweep()).guess!)
    const value = new Float64Array(2)
    loop.evaluate(2 * Math.PI, value)
    const power = value[0]! ** 2 + value[1]! ** 2
    const scatter = points.reduce((sum, point) => {
      loop.evaluate(2 * Math.PI * point.frequency, value)
      return sum + ((point.re - value[0]!) ** 2 + (point.im - value[1]!) ** 2) / power
    }, 0) / points.length
    // Signal to noise: 0.3^2 / |L|^2 = (1 - g2) / g2. The mean of 200 draws scatters by 7 %.
    expect(scatter / (0.09 / power / 64)).toBeGreaterThan(0.75)
    expect(scatter / (0.09 / power / 64)).toBeLessThan(1.25)
  })
})
