import { describe, expect, it } from 'vitest'
import { antennaMount } from '#server/demo/antennaMount'
import { lowerExpression } from '#shared/analysis/expressions/lowerExpression'
import { demoLoopInputs } from './demoLoopInputs'

describe('zeros in z of sixty states that crowd about 1', () => {
  // one was taken for settled at 4e-7 while the others still moved: its step was small only because of them
  it.each(demoLoopInputs(antennaMount).map(({ key, input }) => ({ key, input })))('$key: all are found to the last bits', ({ input }) => {
    const lowered = lowerExpression(input)
    expect(lowered.kind).toBe('factored')
    if (lowered.kind !== 'factored') return
    const { re, im, correction } = lowered.loop.zeros
    correction.forEach((bound, k) => expect(bound).toBeLessThan(1e-14 * Math.max(1, Math.hypot(re[k]!, im[k]!))))
    expect(lowered.structure!.accuracy!.relative).toBeLessThan(1e-9)
  })
})
