import { describe, expect, it } from 'vitest'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import { readLoopInput } from '#shared/analysis/readLoopInput'
import type { CoefficientsInput } from '#shared/types/analysis'
import { checkLoops, type CheckLoop } from './checkLoop'
import { expectCrossings, expectDistances, expectVerdict, TIES } from './expectLoop'
import { sourceForms } from './sourceForms'

/** Low enough for every crossing that the computed values list; with dead time the usual one, or the list would have no end. */
const floorOf = (loop: CheckLoop) => loop.delay > 0 ? -60 : -120

function coefficientsOf(loop: CheckLoop, gainFloor: number): CoefficientsInput {
  return {
    name: loop.id, numerator: loop.num, denominator: loop.den, gainFloor,
    ...loop.delay > 0 ? { deadTime: loop.delay } : {}, ...loop.Ts === null ? {} : { sampleTime: loop.Ts },
  }
}

describe('the textbook loops', () => {
  for (const loop of checkLoops) {
    describe(`${loop.id}: ${loop.title} (${loop.source}; ${loop.confirmation})`, () => {
      const forms = sourceForms(coefficientsOf(loop, floorOf(loop)))
      for (const [form, input] of Object.entries(forms)) {
        it(`from ${form}: every crossing, distance, peak and count as computed`, () => {
          const analysis = analyseLoop(readLoopInput(input))
          expectVerdict(analysis, loop)
          expectCrossings(analysis, loop, floorOf(loop))
          expectDistances(analysis, loop)
          if (!(loop.id in TIES)) {
            expect(analysis.coverage.exceptions).toEqual([])
            expect(analysis.coverage.proven).toBe(true)
          }
        })
      }
      it('with the usual floor of -60 dB leaves out only crossings below it', () => {
        const { gainFloor: _, ...input } = coefficientsOf(loop, -60)
        expectCrossings(analyseLoop(readLoopInput(input)), loop, -60)
      })
    })
  }
})
