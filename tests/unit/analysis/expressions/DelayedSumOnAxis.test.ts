import { describe, expect, it } from 'vitest'
import { DelayedSumOnAxis } from '#shared/analysis/expressions/DelayedSumOnAxis'
import type { GeneralLoop } from '#shared/analysis/expressions/GeneralLoop'
import { lowerExpression } from '#shared/analysis/expressions/lowerExpression'
import { originSeries } from '#shared/analysis/expressions/originSeries'
import type { SumValue } from '#shared/analysis/expressions/SumValue'
import { random } from '../factors/polynomials'

const general = (expression: string): GeneralLoop => {
  const lowered = lowerExpression({ expression })
  if (lowered.kind !== 'general') throw new Error('one dead time')
  return lowered.loop
}

const value = (): SumValue => ({ logGain: 0, phase: 0, slopeRe: 0, slopeIm: 0, bendRe: 0, bendIm: 0 })

const loops = [
  '5/(s+1)*exp(-s)+2/(s+3)*exp(-2*s)',
  '1/(s^2+0.02*s+1)*exp(-0.3*s)+1/(s^2+0.05*s+1.3)*exp(-0.7*s)-0.4/(s+2)',
  '(s^2+1)/(s+1)^3*exp(-s)+(s^2+2)/(s+3)^3',
  '(1-exp(-0.2*s))/(s*(s+1))',
  '1/(s+1)/(1+3/s*(1-exp(-0.5*s)))',
]

describe('DelayedSumOnAxis', () => {
  it.each(loops)('encloses ln|Q| and arg Q, and their slopes, of %s over seeded boxes of every size', (expression) => {
    const loop = general(expression)
    const exact = [...loop.exact.sums.values()]
    const next = random(11)
    let boxes = 0
    loop.sums.forEach((entry, i) => {
      const sum = new DelayedSumOnAxis(loop, entry, originSeries(exact[i]!.sum))
      for (let k = 0; k < 300; k++) {
        const c = 10 ** (5 * next() - 2.5)
        const h = 0.6 * c * 10 ** (-2.5 * next())
        if (!sum.expand(c, h)) continue
        boxes++
        const centre = value()
        const here = value()
        sum.evaluate(c, centre)
        for (const y of [-1, -0.6, -0.1, 0.3, 0.8, 1]) {
          sum.evaluate(c + h * y, here)
          let gain = 0
          let phase = 0
          let gainSlope = 0
          let phaseSlope = 0
          for (let n = 10; n >= 1; n--) {
            gainSlope = gainSlope * y + n * sum.re[n]!
            phaseSlope = phaseSlope * y + n * sum.im[n]!
            gain = (gain + sum.re[n]!) * y
            phase = (phase + sum.im[n]!) * y
          }
          const turn = here.phase - centre.phase - phase
          const bound = sum.tail[0]! * Math.abs(y) ** 11 + 2 * sum.steady[0]!
          expect(Math.abs(here.logGain - centre.logGain - gain)).toBeLessThanOrEqual(bound)
          expect(Math.abs(turn - 2 * Math.PI * Math.round(turn / (2 * Math.PI)))).toBeLessThanOrEqual(bound)
          const slopeBound = sum.tail[1]! * Math.abs(y) ** 10 + 2 * sum.steady[1]! + 1e-13
          expect(Math.abs(h * here.slopeRe - gainSlope)).toBeLessThanOrEqual(slopeBound)
          expect(Math.abs(h * here.slopeIm - phaseSlope)).toBeLessThanOrEqual(slopeBound)
          expect(here.logGain).toBeLessThanOrEqual(sum.greatest)
        }
      }
    })
    expect(boxes).toBeGreaterThan(100)
  })

  it('bounds |Q| where a zero of it lies on the box: 1 + exp(-s) at pi is at most 2 sin(h/2) within h (closed form)', () => {
    const loop = general('(1+exp(-s))/(s+1)')
    const sum = new DelayedSumOnAxis(loop, loop.sums[0]!, null)
    for (const h of [0.5, 0.1, 1e-3, 1e-6]) {
      expect(sum.expand(Math.PI, h)).toBe(false)
      expect(sum.greatest).toBeGreaterThanOrEqual(Math.log(2 * Math.sin(h / 2)))
      expect(sum.greatest).toBeLessThan(Math.log(8 * Math.sin(h / 2)))
    }
  })

  it('divides the zero at the origin out: (1 - exp(-sT))/s is T at 0 and T sinc(wT/2) beside it (closed form)', () => {
    const loop = general('(1-exp(-0.2*s))/(s*(s+1))')
    const exact = [...loop.exact.sums.values()][0]!.sum
    const series = originSeries(exact)
    expect(series?.order).toBe(1)
    const sum = new DelayedSumOnAxis(loop, loop.sums[0]!, series)
    expect(sum.atOrigin().logGain).toBeCloseTo(Math.log(0.2), 14)
    const here = value()
    for (const w of [1e-9, 1e-3, 0.1, 1, 2.4, 2.6, 10]) {
      sum.evaluate(w, here)
      expect(here.logGain).toBeCloseTo(Math.log(Math.abs(Math.sin(0.1 * w)) / (0.5 * w)), 12)
    }
  })
})
