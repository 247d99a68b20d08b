import { describe, expect, it } from 'vitest'
import type { EnclosedSeries } from '#shared/numeric/series/EnclosedSeries'
import { RootIsolator } from '#shared/numeric/series/RootIsolator'

function series(coefficients: number[], steady = 0, tail = 0): EnclosedSeries {
  return {
    degree: coefficients.length - 1,
    coefficients: Float64Array.from(coefficients),
    steady: Float64Array.of(steady, steady, steady),
    tail: Float64Array.of(tail, tail, tail),
    tailOrder: coefficients.length,
  }
}

/** Coefficients of prod (y - root), closed form. */
function fromRoots(roots: number[]): number[] {
  let p = [1]
  for (const root of roots) {
    const next = new Array<number>(p.length + 1).fill(0)
    p.forEach((value, n) => {
      next[n]! -= root * value
      next[n + 1]! += value
    })
    p = next
  }
  return p
}

describe('isolating the roots of an enclosed series', () => {
  const isolator = new RootIsolator()

  it('tells a hump 1e-12 below zero from one 1e-12 above without splitting down to 1e-6', () => {
    // closed form: y^2 - e has the roots +-sqrt(e) for e > 0 and none for e < 0
    expect(isolator.isolate(series([-1e-12, 0, 1]), -1, 0.9)).toBe('complete')
    expect(isolator.from.length).toBe(2)
    expect(isolator.estimate[0]).toBeCloseTo(-1e-6, 12)
    expect(isolator.direction).toEqual([-1, 1])
    expect(isolator.isolate(series([1e-12, 0, 1]), -1, 0.9)).toBe('complete')
    expect(isolator.from.length).toBe(0)
    expect(isolator.undecided.from.length).toBe(0)
  })

  it('does not decide a touch that lies within the bounds, and says where', () => {
    expect(isolator.isolate(series([1e-13, 0, 1], 1e-12), -1, 0.9)).toBe('complete')
    expect(isolator.from.length).toBe(0)
    expect(isolator.undecided.from.length).toBe(1)
    expect(isolator.undecided.from[0]).toBeLessThan(0)
    expect(isolator.undecided.to[0]).toBeLessThan(1e-5)
  })

  it('blames the truncation when that is what hides the sign', () => {
    expect(isolator.isolate(series([1e-3, 0, 1], 0, 0.1), -1, 0.9)).toBe('tail')
  })

  it('says which end has no clear sign', () => {
    expect(isolator.isolate(series([0, 1]), 0, 1)).toBe('unclearFrom')
    expect(isolator.isolate(series([0, 1]), -1, 0)).toBe('unclearTo')
  })

  it('finds nine roots of a polynomial, two of them 1e-5 apart, each in its own bracket', () => {
    const roots = [-0.9, -0.7, -0.41, -0.2, 0.1, 0.10001, 0.5, 0.77, 0.95]
    expect(isolator.isolate(series(fromRoots(roots), 1e-16), -1, 1)).toBe('complete')
    expect(isolator.from.length).toBe(roots.length)
    roots.forEach((root, i) => {
      expect(isolator.from[i]).toBeLessThan(root)
      expect(isolator.to[i]).toBeGreaterThan(root)
      expect(isolator.estimate[i]).toBeCloseTo(root, 7)
    })
  })
})
