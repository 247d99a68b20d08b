import { expect } from 'vitest'
import { rationalPart } from '#shared/analysis/expressions/rationalPart'
import { prepareFactoredGain } from '#shared/analysis/prepareFactoredGain'
import { discretise } from '#shared/analysis/sampling/discretise'
import type { HoldGain } from '#shared/types/block'
import { exponential, minus, over, size, type Complex } from './complexPairs'
import { exactOf } from './exactOf'

/** The discrete equivalent of a plant typed out behind a hold, on the unit circle. */
export function equivalentAt(plant: string, hold: HoldGain): (w: number) => Complex {
  const { evaluate } = prepareFactoredGain(rationalPart(discretise(exactOf(plant), hold).loop, hold.sampleTime))
  const out = new Float64Array(2)
  return (w) => {
    expect(evaluate(w, out)).toBe(true)
    return [out[0] as number, out[1] as number]
  }
}

/** Frequency response of the zero-order hold. */
export const zeroOrderKernel = (T: number) => (v: number): Complex => over(minus([1, 0], exponential([0, -v * T])), [0, v * T])

export function expectClose(found: Complex, expected: Complex, tolerance: number) {
  expect(size(minus(found, expected)) / size(expected)).toBeLessThan(tolerance)
}
