import { describe, expect, it } from 'vitest'
import { converter } from '#server/demo/converter'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import { demoLoopInputs } from './demoLoopInputs'

describe('the motor current loop of the demo, pulse-width modulated with 1.5 samples of delay', () => {
  const cases = demoLoopInputs(converter).filter(({ key }) => key.startsWith('MC'))

  it.each(cases)('$key is judged by the exact equivalent, and says that the approximation is wrong by more than 3 deg', ({ input }) => {
    const { gainCrossovers, stability, structure, coverage } = analyseLoop(input)
    expect([stability.verdict, coverage.proven, structure?.approximated]).toEqual(['stable', true, true])
    expect(gainCrossovers.length).toBe(1)
    expect(Math.abs(gainCrossovers[0]?.approximation?.phase ?? 0)).toBeGreaterThan(3)
  })
})
