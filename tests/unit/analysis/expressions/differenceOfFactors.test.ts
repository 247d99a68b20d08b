import { describe, expect, it } from 'vitest'
import { BlockScope } from '#shared/analysis/blocks/BlockScope'
import { exactLeafSource } from '#shared/analysis/blocks/exactLeafSource'
import { differenceOfFactors } from '#shared/analysis/expressions/differenceOfFactors'
import { rationalPart } from '#shared/analysis/expressions/rationalPart'

function exactOf(expression: string, sampleTime?: number) {
  const scope = new BlockScope({ expression, ...sampleTime === undefined ? {} : { sampleTime } }, exactLeafSource())
  return scope.arithmetic.settle(scope.evaluate()!, 0).value
}

describe('how far factors in doubles lie from the exact loop gain', () => {
  it('a zero moved by 1e-3 of its damping shows, at its own frequency', () => {
    const exact = exactOf('(s^2+0.02*s+25)/(s*(s+1)*(s^2+0.3*s+9))')
    const loop = rationalPart(exact, undefined)
    const k = Array.from(loop.zeros.re).findIndex(re => re !== 0)
    loop.zeros.re[k] = loop.zeros.re[k]! * 1.001
    const { largest } = differenceOfFactors(exact, loop)
    expect(largest).toBeGreaterThan(0.9e-3)
    expect(largest).toBeLessThan(4.1e-3)
  })

  it('factors as found differ by no more than rounding over the damping', () => {
    const exact = exactOf('(s^2+0.02*s+25)/(s*(s+1)*(s^2+0.3*s+9))')
    // half a unit in the last place of 5, over 0.01, told within a factor of four
    expect(differenceOfFactors(exact, rationalPart(exact, undefined)).largest).toBeLessThan(4 * 2 ** -51 / 0.01)
    const sampled = exactOf('(z^2-1.98*z+0.9802)/((z-1)*(z^2-1.9*z+0.95))', 0.01)
    expect(differenceOfFactors(sampled, rationalPart(sampled, 0.01)).largest).toBeLessThan(1e-12)
  })

  it('a wrong gain shows everywhere', () => {
    const exact = exactOf('2/(s+1)')
    const loop = rationalPart(exact, undefined)
    const { largest, frequencies } = differenceOfFactors(exact, { ...loop, gain: 2.2 })
    // of the size of the larger part, told within a factor of four
    expect(largest).toBeGreaterThan(0.05)
    expect(frequencies).toBeGreaterThan(5)
  })
})
