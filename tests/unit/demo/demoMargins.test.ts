import { describe, expect, it } from 'vitest'
import { converter } from '#server/demo/converter'
import { gangway } from '#server/demo/gangway'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import type { ListedFrequency } from '#shared/types/analysis'
import golden from '../../golden/demo/margins.json'
import { demoLoopInputs } from './demoLoopInputs'

/**
 * Every crossing, closest approach and verdict of the demo's two first systems, as they were while each loop was one formula: however a loop is
 * built, its margins stay these. Kept from the engine's own results of that time; the engine is held against outside values in tests/reference.
 */
interface GoldenMargins {
  verdict: string
  proven: boolean
  vectorMargin: { distance: number, frequency: ListedFrequency }
  /** frequency, phase margin in deg, delay margin in s */
  gainCrossovers: [number, number, number][]
  /** frequency, gain margin in dB */
  phaseCrossovers: [number, number][]
  /** frequency, distance */
  closestApproaches: [number, number][]
}

/**
 * What the engine promises, twice: both sides are results of its own. Frequencies relative; deg, dB and distances as they are. The converter's poles and gains were
 * discretised by hand then and rounded to nine digits, 5e-10 of 1, which moves a pole at 0.995 by 1e-7 of its distance from 1.
 */
const accuracyOf = (key: string) => ({ frequency: /^(?:CU|VO) /.test(key) ? 1e-8 : 2e-9, margin: 2e-6, distance: 2e-9 })

const margins = golden as unknown as Record<string, GoldenMargins>
const cases = [gangway, converter].flatMap(demoLoopInputs)

const near = (value: unknown, expected: number, tolerance: number, what: string) => {
  expect(typeof value, what).toBe('number')
  expect(Math.abs(value as number - expected), `${what}: ${String(value)} for ${expected}`).toBeLessThanOrEqual(tolerance)
}

describe('the demo, however its loops are built', () => {
  it('has every loop and condition it had', () => {
    expect(cases.map(entry => entry.key)).toEqual(expect.arrayContaining(Object.keys(margins)))
  })

  it.each(cases.filter(({ key }) => key in margins))('keeps every margin of $key', ({ key, input }) => {
    const expected = margins[key] as GoldenMargins
    const accuracy = accuracyOf(key)
    const found = analyseLoop(input)
    expect({ verdict: found.stability.verdict, proven: found.coverage.proven }).toEqual({ verdict: expected.verdict, proven: expected.proven })
    expect([found.gainCrossovers.length, found.phaseCrossovers.length, found.closestApproaches.length])
      .toEqual([expected.gainCrossovers.length, expected.phaseCrossovers.length, expected.closestApproaches.length])
    expected.gainCrossovers.forEach(([frequency, phaseMargin, delayMargin], index) => {
      const crossover = found.gainCrossovers[index]
      near(crossover?.frequency, frequency, accuracy.frequency * frequency, 'gain crossover')
      near(crossover?.phaseMargin, phaseMargin, accuracy.margin, 'phase margin')
      near(crossover?.delayMargin, delayMargin, accuracy.margin / frequency, 'delay margin')
    })
    expected.phaseCrossovers.forEach(([frequency, gainMargin], index) => {
      const crossover = found.phaseCrossovers[index]
      near(crossover?.frequency, frequency, accuracy.frequency * frequency, 'phase crossover')
      near(crossover?.gainMargin, gainMargin, accuracy.margin, 'gain margin')
    })
    expected.closestApproaches.forEach(([frequency, distance], index) => {
      const approach = found.closestApproaches[index]
      near(approach?.frequency, frequency, accuracy.frequency * frequency, 'closest approach')
      near(approach?.distance, distance, accuracy.distance, 'distance')
    })
    near(found.vectorMargin?.distance, expected.vectorMargin.distance, accuracy.distance, 'vector margin')
  })
})
