import { describe, expect, it } from 'vitest'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import { compareSources, type ComparedSource } from '#shared/analysis/structure/compareSources'
import type { LoopInput } from '#shared/types/analysis'

const source = (name: string, input: LoopInput): ComparedSource => ({ name, input, analysis: analyseLoop(input) })
const model = (name: string, expression: string, more: object = {}) => source(name, { expression, ...more })

/** Samples of k exp(-j w T) / (j w). */
function sweep(name: string, frequencies: number[], k = 1, delay = 0, more: object = {}): ComparedSource {
  const points = frequencies.map(frequency => ({ frequency, re: -k * Math.sin(frequency * delay) / frequency, im: -k * Math.cos(frequency * delay) / frequency }))
  return source(name, { measured: { quantity: 'loopGain', points }, openLoopUnstablePoles: 0, openLoopOriginPoles: 1, ...more })
}

describe('how far two sources lie apart', () => {
  it('without a loop gain there is no comparison, and the source is named', () => {
    const good = model('design model', '1/s')
    expect(compareSources(good, { name: 'sweep 1', input: null, analysis: null })).toEqual({
      frequencyUnit: 'rad/s', reference: 'design model', other: 'sweep 1', bands: [], basis: '', reason: '\'sweep 1\' gives no loop gain to compare.' })
    const broken = compareSources(good, { name: 'draft', input: { expression: '1/(s+' }, analysis: null })
    expect(broken.reason).toMatch(/^'draft' gives no loop gain to compare: /)
  })

  it('ranges without a common frequency are told', () => {
    expect(compareSources(sweep('low', [0.1, 0.2]), sweep('high', [1, 2]))).toMatchObject({ bands: [], reason: '\'low\' and \'high\' have no frequency in common.' })
    expect(compareSources(sweep('sweep 1', [40, 50]), model('sampled', '0.1/(z-1)', { sampleTime: 0.1 })).reason).toMatch(/no frequency in common/)
    expect(compareSources(sweep('wide', [1, 100]), sweep('between', [2, 3])).reason).toBe('No point of \'wide\' lies where the other has a loop gain.')
  })

  it('two constants have nothing to compare about', () => {
    expect(compareSources(model('a', '0.5'), model('b', '0.25')).reason).toBe('Neither has a crossing or a break frequency to compare about.')
  })

  it('points below the gain floor of both are left out', () => {
    expect(compareSources(sweep('a', [1e4, 1e5]), sweep('b', [1e4, 1e5])).reason).toBe('At no common frequency do both have a loop gain above the gain floor.')
  })

  it('a source does not differ from itself', () => {
    const { bands, reason } = compareSources(model('a', '(s+2)/(s*(s+1)^2)'), model('b', '(s+2)/(s*(s+1)^2)'))
    expect(reason).toBeNull()
    expect(bands.map(({ gain, phase, relative }) => [gain.difference, phase.difference, relative.ratio])).toEqual(bands.map(() => [0, 0, 0]))
  })

  it('a factor of 2 is 6.0206 dB at every frequency, and its relative size 1/|1 + jw| |k/..| follows the closed form', () => {
    // L = 1/s, other 2/s: |dL|/|1 + L| = (1/w)/sqrt(1 + 1/w^2) = 1/sqrt(1 + w^2), largest at the lowest frequency of each band
    const { bands, basis } = compareSources(model('reference', '1/s'), model('twice', '2/s'))
    expect(basis).toMatch(/^Compared at \d+ frequencies, all crossings of both among them\.$/)
    expect(bands.map(({ from, to }) => [from, to])).toEqual([[0.1, 1], [1, 10], [10, 20]])
    for (const { from, gain, phase, relative } of bands) {
      expect(gain.difference).toBeCloseTo(20 * Math.log10(2), 10)
      expect(phase.difference).toBeCloseTo(0, 10)
      expect(relative.frequency).toBeCloseTo(from, 10)
      expect(relative.ratio).toBeCloseTo(1 / Math.sqrt(1 + from * from), 10)
    }
  })

  it('a dead time is a difference in phase: 180/pi w T of lag, at the top of each decade', () => {
    const frequencies = [1, 2, 5, 10, 20, 50, 100]
    const { bands, basis } = compareSources(model('design model', '1/s'), sweep('sweep 1', frequencies, 1, 0.01))
    expect(basis).toBe('Compared at 7 points of \'sweep 1\'.')
    expect(bands.map(({ from, to }) => [from, to])).toEqual([[1, 10], [10, 100]])
    expect(bands.map(({ phase }) => phase.frequency)).toEqual([5, 100])
    expect(bands[0]!.phase.difference).toBeCloseTo(-0.05 * 180 / Math.PI, 9)
    expect(bands[1]!.phase.difference).toBeCloseTo(-180 / Math.PI, 9)
  })

  it('a loop over a measured block is compared at its points', () => {
    const points = [1, 2, 5].map(frequency => ({ frequency, re: 0, im: -1 / frequency }))
    const measured: LoopInput = { expression: '2*G', blocks: { G: { kind: 'measured', points } } }
    const { basis, bands } = compareSources(model('model', '1/s'), source('over a sweep', measured))
    expect(basis).toBe('Compared at 3 points of \'over a sweep\'.')
    expect(bands[0]!.gain.difference).toBeCloseTo(20 * Math.log10(2), 9)
  })

  it('differences are of the other less the reference, whichever of the two is measured', () => {
    const points = sweep('sweep', [1, 2, 5], 2, 0.1)
    const there = compareSources(model('model', '1/s'), points).bands[0]!
    const back = compareSources(points, model('model', '1/s')).bands[0]!
    expect(there.gain.difference).toBeCloseTo(6.0206, 4)
    expect(back.gain.difference).toBeCloseTo(-6.0206, 4)
    expect(back.phase.difference).toBeCloseTo(-there.phase.difference, 12)
  })

  it('between two sweeps the points of the coarser count, and that is said', () => {
    const fine = sweep('fine', Array.from({ length: 41 }, (_, k) => 10 ** (k / 20)), 1)
    const coarse = sweep('coarse', [0.5, 2, 5, 20, 200], 1.1)
    const { bands, basis } = compareSources(fine, coarse)
    expect(basis).toBe('Compared at 3 points of \'coarse\', \'fine\' between its own points by interpolation of log gain and unwrapped phase.')
    expect(bands.map(({ from, to }) => [from, to])).toEqual([[2, 10], [10, 20]])
    // 1/s is a straight line of log gain over log frequency: the interpolation is exact
    for (const { gain } of bands) expect(gain.difference).toBeCloseTo(20 * Math.log10(1.1), 9)
  })

  it('frequencies stand in the unit of the reference, whatever that of the other', () => {
    const inHz = sweep('Hz', [1, 2], 1, 0, { frequencyUnit: 'Hz' })
    const { frequencyUnit, bands } = compareSources(inHz, model('model', '1/s'))
    expect(frequencyUnit).toBe('Hz')
    expect(bands.map(({ from, to }) => [from, to])).toEqual([[1, 2]])
    // the samples are 1/(j f), the model 1/(j 2 pi f)
    expect(bands[0]!.gain.difference).toBeCloseTo(-20 * Math.log10(2 * Math.PI), 9)
  })

  it('a narrow resonance of one model is found between the points of the grid', () => {
    // 1 + 1e-4 s w/(s^2 + 2e-6 w s + w^2) at w = pi: at resonance 1 + 1e-4/(2e-6) = 51
    const w = Math.PI
    const { bands } = compareSources(model('smooth', '2/(s+1)'), model('resonant', `2/(s+1)*(1+1e-4*${w}*s/(s^2+2e-6*${w}*s+${w * w}))`))
    const largest = Math.max(...bands.map(({ gain }) => gain.difference))
    expect(largest).toBeCloseTo(20 * Math.log10(51), 3)
  })

  it('the reference through -1 gives a number that can be stored', () => {
    const through = source('marginal', { measured: { quantity: 'loopGain', points: [{ frequency: 1, re: -1, im: 0 }, { frequency: 2, re: -0.5, im: -0.5 }] } })
    const { bands } = compareSources(through, sweep('other', [1, 2]))
    expect(bands[0]!.relative.frequency).toBe(1)
    expect(bands[0]!.relative.ratio).toBeGreaterThan(1e15)
    expect(Number.isFinite(bands[0]!.relative.ratio)).toBe(true)
  })

  it('a band narrows what is compared', () => {
    const { bands } = compareSources(model('a', '1/s', { band: [0.5, 5] }), model('b', '2/s'))
    expect([bands[0]!.from, bands[bands.length - 1]!.to]).toEqual([0.5, 5])
  })
})
