import { describe, expect, it } from 'vitest'
import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'
import { checkExpression } from '#shared/analysis/expressions/checkExpression'
import { lowerExpression } from '#shared/analysis/expressions/lowerExpression'
import type { FactorList } from '#shared/analysis/FactoredLoop'

const factored = (expression: string, parameters: Record<string, number> = {}, sampleTime?: number) => {
  const lowered = lowerExpression({ expression, parameters, ...(sampleTime === undefined ? {} : { sampleTime }) })
  if (lowered.kind !== 'factored') throw new Error('several dead times')
  return lowered
}
const general = (expression: string, parameters: Record<string, number> = {}) => {
  const lowered = lowerExpression({ expression, parameters })
  if (lowered.kind !== 'general') throw new Error('one dead time')
  return lowered.loop
}
const roots = (list: FactorList) => Array.from(list.re, (re, k) => [re, list.im[k] as number])
  .sort((a, b) => (a[0] as number) - (b[0] as number) || (a[1] as number) - (b[1] as number))
const refusal = (expression: string, parameters: Record<string, number> = {}, sampleTime?: number) => {
  try {
    factored(expression, parameters, sampleTime)
  }
  catch (error) {
    if (error instanceof AnalysisInputError) return [error.message, error.position]
    throw error
  }
  return null
}

describe('lowerExpression', () => {
  it('refuses zero, division by zero, lead times, improper parts and missing values at their place', () => {
    expect(refusal('s-s')?.[0]).toContain('The expression is zero')
    expect(refusal('1/(s-s)')).toEqual(['Division by zero.', 3])
    expect(refusal('1/s+exp(-s*T)/s', { T: -1 })?.[1]).toBe(4)
    expect(refusal('1/s+s*2')).toEqual([expect.stringContaining('grows without bound'), 4])
    expect(refusal('1/exp(-s)/s')?.[0]).toContain('look into the future')
    expect(refusal('z^2/(z-1)', {}, 0.1)?.[0]).toContain('future samples')
    expect(refusal('1/s*k')?.[0]).toContain('Unknown name "k"')
    expect(refusal('1/s*k', { k: Number.NaN })?.[0]).toContain('not a finite number')
    expect(refusal('toString/s')?.[0]).toContain('Unknown name')
  })

  it('refuses orders and numbers beyond its limits with the place, in bounded time', () => {
    expect(refusal('1/((s+1)^50)^50')?.[0]).toContain('order would be 2500')
    expect(refusal('1/(((((2^50)^50)^50)^50)^50)/s')?.[0]).toContain('too many digits')
  })

  it('keeps factors as they are typed', () => {
    const { loop } = factored('25*(s+wz)/(s*(s+10))*exp(-0.01*s)', { wz: 2 })
    expect([loop.gain, roots(loop.zeros), roots(loop.poles), loop.deadTime]).toEqual([25, [[-2, 0]], [[-10, 0], [0, 0]], 0.01])
  })

  it('adds dead times of products and powers', () => {
    expect(factored('exp(-s*(T1+T2))*exp(s*(-T1))^2/s', { T1: 0.25, T2: 0.5 }).loop.deadTime).toBe(1.25)
    expect(factored('exp(-s*0.5)/s/exp(-s*0.5)').loop.deadTime).toBe(0)
  })

  it('brings a sum of modes over its common denominator without rounding: 1/(s+1) + 1/(s+2) = 2(s+1.5)/((s+1)(s+2)) (closed form)', () => {
    const { loop } = factored('1/(s+1)+1/(s+2)')
    expect([loop.gain, roots(loop.zeros), roots(loop.poles)]).toEqual([2, [[-1.5, 0]], [[-2, 0], [-1, 0]]])
  })

  it('cancels what cancels exactly: (s+0.1)^2 - s^2 - 0.01 has degree 1 but for the rounding of 0.1 (its square is not the double 0.01)', () => {
    const { loop } = factored('((s+0.1)^2-s^2-0.1*0.1)/(s+3)')
    expect([loop.gain, roots(loop.zeros)]).toEqual([0.2, [[0, 0]]])
  })

  it('makes a feedback form rational: G C / (1 + G H) has the zeros of H and not the poles of G (closed form)', () => {
    // G = 3/(s-1), H = 4/(s+5), C = (s+2)/s: 3 (s+2)(s+5) / (s (s^2+4s+7))
    const { loop, notes } = factored('3/(s-1)*(s+2)/s/(1+3/(s-1)*4/(s+5))')
    expect(loop.gain).toBe(3)
    expect(roots(loop.zeros)).toEqual([[-5, 0], [-2, 0]])
    expect(roots(loop.poles)).toEqual([[-2, -Math.sqrt(3)], [-2, Math.sqrt(3)], [0, 0]].map(([re, im]) => [re, expect.closeTo(im as number, 15)]))
    expect(notes).toEqual([])
  })

  it('makes the same of a feedback form written as a power', () => {
    const { loop } = factored('3/(s-1)*((s+2)/s)*(1+3/(s-1)*4/(s+5))^-1')
    expect(roots(loop.zeros)).toEqual([[-5, 0], [-2, 0]])
  })

  it('keeps an unstable pole that a zero hides, and tells of it', () => {
    const { loop, notes } = factored('(s-1)/(s+2)/(s-1)')
    expect([roots(loop.zeros), roots(loop.poles)]).toEqual([[[1, 0]], [[-2, 0], [1, 0]]])
    expect(notes).toEqual([expect.stringContaining('hides the pole at s = 1')])
  })

  it('reads a loop in z with negative powers: z^-1/(1-0.5 z^-1) = 1/(z-0.5)', () => {
    const { loop } = factored('z^-1/(1-0.5*z^-1)', {}, 0.1)
    expect([loop.gain, roots(loop.zeros), roots(loop.poles), loop.sampleTime]).toEqual([1, [], [[0.5, 0]], 0.1])
  })

  it('gives the roots of a polynomial with decimal coefficients and of its typed factors alike', () => {
    const typed = factored('1/((s^2+2*0.01*3*s+9)*(s+0.7))').loop
    const polynomial = factored('1/(s^3+0.76*s^2+9.042*s+6.3)').loop
    roots(typed.poles).forEach(([re, im], k) => {
      expect(roots(polynomial.poles)[k]?.[0]).toBeCloseTo(re as number, 14)
      expect(roots(polynomial.poles)[k]?.[1]).toBeCloseTo(im as number, 14)
    })
  })

  it('brings terms of one dead time together and leaves those of several apart', () => {
    const loop = general('1/(s+1)*exp(-s)+2/(s+3)*exp(-2*s)+1/(s+3)*exp(-s)')
    expect(loop.rational.deadTime).toBe(1)
    expect(roots(loop.rational.poles)).toEqual([[-3, 0], [-1, 0]])
    expect(loop.sums.map(sum => [sum.power, sum.terms.map(term => [term.gain, term.deadTime])])).toEqual([[1, [[1, 0], [1, 1]]]])
    expect(loop.rational.gain).toBe(2)
  })

  it('takes dead times that differ by rounding alone as one', () => {
    expect(factored('exp(-0.3*s)/s+exp(-s*(0.1+0.2))/s').loop.gain).toBe(2)
  })

  it('divides by a sum with a dead time (a predictor): 1/(1+2/(s+1)(1-exp(-sT))) = (s+1)/(s+3-2exp(-sT)) (closed form)', () => {
    const loop = general('1/(1+2/(s+1)*(1-exp(-s*T)))', { T: 0.3 })
    expect(roots(loop.rational.zeros)).toEqual([[-1, 0]])
    expect(loop.sums).toHaveLength(1)
    expect(loop.sums[0]).toMatchObject({ power: -1, terms: [{ gain: 1, deadTime: 0 }, { gain: -2, deadTime: 0.3 }] })
  })

  it('refuses an inner loop that grows without bound around a dead time', () => {
    expect(() => general('1/(s*(1+s*exp(-s)))')).toThrow('endlessly many unstable poles')
  })
})

describe('checkExpression', () => {
  it('finds nothing in a sound expression and one fault, with its place, in another', () => {
    expect(checkExpression('k/s', { variable: 's', parameterNames: ['k'] })).toEqual([])
    expect(checkExpression('k/s', { variable: 's', parameterNames: [] })).toEqual([{ message: expect.stringContaining('Unknown name "k"'), position: 0 }])
  })

  it('tells what depends on values once they are given', () => {
    const names = { variable: 's' as const, parameterNames: ['k'] }
    expect(checkExpression('1/s+k*s', names)).toEqual([])
    expect(checkExpression('1/s+k*s', names, { k: 0 })).toEqual([])
    expect(checkExpression('1/s+k*s', names, { k: 1 })).toEqual([{ message: expect.stringContaining('Improper'), position: 4 }])
  })
})
