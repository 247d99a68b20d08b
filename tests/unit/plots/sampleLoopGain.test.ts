import { describe, expect, it } from 'vitest'
import { sampleLoopGain } from '#shared/plots/sampling/sampleLoopGain'
import { loopGainOfRoots, pair } from './loopGainOfRoots'

const resonant = (damping: number) => loopGainOfRoots({ gain: 8, zeros: [pair(95, damping * 2)], poles: [[0, 0], [-40, 0], pair(80, damping)], deadTime: 0.002 })

/** Greatest |L| among the samples. */
const peak = (curve: { re: Float64Array, im: Float64Array }) => Math.max(...Array.from(curve.re, (re, i) => Math.hypot(re, curve.im[i]!)))

describe('sampling a loop gain for the figures', () => {
  it('gives nothing for a range outside the axis', () => {
    const gain = { ...resonant(0.01), axisEnd: 10 }
    expect(sampleLoopGain(gain, { from: 20, to: 100 }).frequency.length).toBe(0)
    expect(sampleLoopGain(gain, { from: 0, to: 100 }).frequency.length).toBe(0)
  })

  it('ends at the half sample rate', () => {
    const curve = sampleLoopGain({ ...resonant(0.01), axisEnd: 314 }, { from: 1, to: 1000 })
    expect(curve.frequency.at(-1)).toBe(314)
  })

  it('draws a resonance of damping 1e-5 whole, with few points', () => {
    const gain = resonant(1e-5)
    const curve = sampleLoopGain(gain, { from: 1, to: 1000 })
    // closed form: beside the pole pair, |1 - (w/wn)^2 + 2j zeta w/wn| is least, 2 zeta to first order, at w = wn
    const out = new Float64Array(2)
    gain.evaluate(80, out)
    expect(peak(curve)).toBeGreaterThan(0.999 * Math.hypot(out[0]!, out[1]!))
    expect(curve.frequency.length).toBeLessThan(600)
  })

  it('gives a plain integrator few points', () => {
    expect(sampleLoopGain(loopGainOfRoots({ gain: 1, poles: [[0, 0]] }), { from: 0.1, to: 10 }).frequency.length).toBeLessThan(30)
  })

  it('keeps the exact frequencies it is told', () => {
    const curve = sampleLoopGain(resonant(0.01), { from: 1, to: 1000, exact: [7.123456789, 81.2] })
    expect(curve.frequency).toContain(7.123456789)
    expect(curve.frequency).toContain(81.2)
  })

  it('breaks the line at an undamped pole and keeps it elsewhere', () => {
    const curve = sampleLoopGain(loopGainOfRoots({ gain: 1, poles: [[0, 0], [0, 30]] }), { from: 1, to: 1000 })
    const breaks = Array.from(curve.re).filter(Number.isNaN).length
    expect(breaks).toBe(1)
  })

  it('breaks the line too where the pole lies between two doubles', () => {
    const curve = sampleLoopGain(loopGainOfRoots({ gain: 1, poles: [[0, 0], [0, 10 * Math.SQRT2]] }), { from: 1, to: 1000 })
    expect(Array.from(curve.re).filter(Number.isNaN).length).toBe(1)
  })

  it('follows every turn of a long dead time', () => {
    const gain = loopGainOfRoots({ gain: 5, poles: [[-1, 0]], deadTime: 1 })
    const { frequency } = sampleLoopGain(gain, { from: 0.1, to: 100 })
    for (let i = 1; i < frequency.length; i++) expect(frequency[i]! - frequency[i - 1]!).toBeLessThan(Math.PI)
  })

  it('ends the line, and says where, when the turns are more than it can follow: never a chord over what it did not look at', () => {
    // closed form: 80 s of dead time turn L by 80 rad for each rad/s, some 13 turns; 1e4 rad/s hold more than 1e5 turns
    const gain = loopGainOfRoots({ gain: 5, poles: [[-1, 0]], deadTime: 80 })
    const exact = [5000, 5001, 9000]
    const { frequency, re, drawnTo } = sampleLoopGain(gain, { from: 1, to: 1e4, exact, mostPoints: 200_000 })
    expect(drawnTo).toBeGreaterThan(1)
    expect(drawnTo).toBeLessThan(5000)
    for (let i = 1; i < frequency.length; i++) {
      if (frequency[i]! > drawnTo! && Number.isFinite(re[i]!)) expect(re[i - 1]).toBeNaN()
    }
    expect(sampleLoopGain(resonant(0.01), { from: 1, to: 1000 }).drawnTo).toBeUndefined()
  })

  it('stays within its tolerance of the curve everywhere near -1', () => {
    const gain = resonant(0.003)
    const { frequency, re, im } = sampleLoopGain(gain, { from: 1, to: 1000 })
    const out = new Float64Array(2)
    for (let i = 1; i < frequency.length; i++) {
      for (let k = 1; k < 20; k++) {
        gain.evaluate(frequency[i - 1]! * (frequency[i]! / frequency[i - 1]!) ** (k / 20), out)
        if (Math.hypot(1 + out[0]!, out[1]!) > 2.5) continue
        const [bx, by] = [re[i]! - re[i - 1]!, im[i]! - im[i - 1]!]
        const [px, py] = [out[0]! - re[i - 1]!, out[1]! - im[i - 1]!]
        const t = Math.min(1, Math.max(0, (px * bx + py * by) / (bx * bx + by * by || 1)))
        // 0.3 px at 180 px a unit of L
        expect(Math.hypot(px - t * bx, py - t * by)).toBeLessThan(0.3 / 180)
      }
    }
  })

  it('gives the same samples twice', () => {
    const once = sampleLoopGain(resonant(0.001), { from: 1, to: 1000 })
    expect(sampleLoopGain(resonant(0.001), { from: 1, to: 1000 })).toEqual(once)
  })
})
