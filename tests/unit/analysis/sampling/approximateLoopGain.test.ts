import { describe, expect, it } from 'vitest'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import { approximateLoopGain } from '#shared/analysis/sampling/approximateLoopGain'
import type { ExpressionInput } from '#shared/types/analysis'

const T = 0.2
const sampled: ExpressionInput = {
  expression: 'K*H0*D*G',
  parameters: { k: 0.7 },
  blocks: {
    K: { kind: 'expression', expression: 'k*(z - 0.8)/(z - 0.4)', sampleTime: T },
    H0: { kind: 'hold', hold: 'zeroOrder', sampleTime: T },
    D: { kind: 'deadTime', deadTime: 0.3, unit: 'samples' },
    G: { kind: 'expression', expression: '1/(s*(s+1))' },
  },
}

/** C(e^(jwT)) (1 - e^(-jwT))/(jwT) e^(-0.3 jwT) / (jw (jw + 1)), written out. */
function writtenOut(w: number): [number, number] {
  const [c, s] = [Math.cos(w * T), Math.sin(w * T)]
  const size = 0.7 * Math.hypot(c - 0.8, s) / Math.hypot(c - 0.4, s) * Math.sin(w * T / 2) / (w * T / 2) / (w * Math.hypot(w, 1))
  const angle = Math.atan2(s, c - 0.8) - Math.atan2(s, c - 0.4) - 0.8 * w * T - Math.PI / 2 - Math.atan(w)
  return [size * Math.cos(angle), size * Math.sin(angle)]
}

describe('the continuous approximation of a sampled loop', () => {
  it('there is none where no hold stands: a continuous loop, a loop in z alone', () => {
    expect(approximateLoopGain({ expression: 'G', blocks: { G: { kind: 'expression', expression: '1/(s+1)' } } })).toBeNull()
    expect(approximateLoopGain({ expression: 'C', blocks: { C: { kind: 'expression', expression: '1/(z-1)', sampleTime: T } } })).toBeNull()
    expect(approximateLoopGain({ expression: '1/(s+1)' })).toBeNull()
  })

  it('a hold that the loop does not use makes no difference', () => {
    const analysis = analyseLoop({ expression: 'G', blocks: { G: { kind: 'expression', expression: '10/(s+1)^2' }, H0: { kind: 'hold', hold: 'zeroOrder', sampleTime: T } } })
    expect(analysis.structure?.approximated).toBe(false)
    expect(analysis.gainCrossovers.every(crossing => crossing.approximation === undefined)).toBe(true)
  })

  it('is controller, hold, dead time and plant, each by itself, up to half the sampling frequency', () => {
    const { evaluate, axisEnd } = approximateLoopGain(sampled)!
    const out = new Float64Array(2)
    expect(axisEnd).toBeCloseTo(Math.PI / T, 12)
    for (const w of [1e-3, 0.5, 3, 15.7]) {
      expect(evaluate(w, out)).toBe(true)
      const [re, im] = writtenOut(w)
      expect(Math.hypot(out[0]! - re, out[1]! - im) / Math.hypot(re, im)).toBeLessThan(1e-13)
    }
    expect(evaluate(16, out)).toBe(false)
    expect(evaluate(0, out)).toBe(false)
  })

  it('what it says less what the exact loop gain says stands at every crossing and approach, in the frequency unit of the loop', () => {
    for (const unit of ['rad/s', 'Hz'] as const) {
      const analysis = analyseLoop({ ...sampled, frequencyUnit: unit })
      expect(analysis.structure?.approximated).toBe(true)
      const scale = unit === 'Hz' ? 2 * Math.PI : 1
      const [crossing] = analysis.gainCrossovers
      const [re, im] = writtenOut(crossing!.frequency * scale)
      const { gain, phase, distance } = crossing!.approximation!
      expect(gain).toBeCloseTo(20 * Math.log10(Math.hypot(re, im)), 9)
      expect(phase).toBeCloseTo(180 + Math.atan2(im, re) * 180 / Math.PI - crossing!.phaseMargin, 9)
      expect(distance).toBeCloseTo(Math.hypot(1 + re, im) - crossing!.distance!, 11)
      for (const entry of [...analysis.phaseCrossovers, ...analysis.closestApproaches]) expect(entry.approximation).toBeDefined()
    }
  })

  it('an inner loop around hold and plant is approximated through its feedback', () => {
    const inner: ExpressionInput = { ...sampled, expression: 'K*H0*G/(1 + H0*G)' }
    const { evaluate } = approximateLoopGain(inner)!
    const out = new Float64Array(2)
    expect(evaluate(2, out)).toBe(true)
    const w = 2
    const hold = Math.sin(w * T / 2) / (w * T / 2)
    // P = hold e^(-jwT/2) / (-w^2 + jw); P/(1 + P) = hold e^(-jwT/2) / (hold e^(-jwT/2) - w^2 + jw)
    const [x, y] = [hold * Math.cos(w * T / 2), -hold * Math.sin(w * T / 2)]
    const [p, q] = [x - w * w, y + w]
    const closed = [(x * p + y * q) / (p * p + q * q), (y * p - x * q) / (p * p + q * q)]
    const [c, s] = [Math.cos(w * T), Math.sin(w * T)]
    const controller = [0.7 * ((c - 0.8) * (c - 0.4) + s * s) / ((c - 0.4) ** 2 + s * s), 0.7 * (s * (c - 0.4) - (c - 0.8) * s) / ((c - 0.4) ** 2 + s * s)]
    expect(out[0]).toBeCloseTo(closed[0]! * controller[0]! - closed[1]! * controller[1]!, 13)
    expect(out[1]).toBeCloseTo(closed[0]! * controller[1]! + closed[1]! * controller[0]!, 13)
  })
})

describe('what doubles cannot hold of a sampled loop is told', () => {
  it('a mode of 2 rad/s, damped by 0.0025 % of critical and sampled at 20 kHz: its roots in z are not known to 1e-9 of their distance from the circle', () => {
    const { structure, coverage } = analyseLoop({
      expression: 'H0*G',
      blocks: { H0: { kind: 'hold', hold: 'zeroOrder', sampleTime: 5e-5 }, G: { kind: 'expression', expression: '1e-4/(s^2 + 1e-4*s + 4)' } },
    })
    // 1e-16 over zeta w T = 5e-5 * 5e-5
    expect(structure!.accuracy!.relative).toBeGreaterThan(1e-9)
    expect(structure!.accuracy!.relative).toBeLessThan(1e-7)
    expect(coverage.proven).toBe(false)
    expect(coverage.exceptions[0]).toMatchObject({ code: 'accuracy' })
    expect(coverage.exceptions[0]!.reason).toMatch(/slow, light mode sampled very fast/)
  })
})
