import { describe, expect, it } from 'vitest'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import { prepareLoopGain } from '#shared/analysis/prepareLoopGain'
import type { ZerosPolesInput } from '#shared/types/analysis'
import { exactAnswer } from '../../../oracle/exactAnswer'
import { generateLoop } from '../../../oracle/generateLoop'

const LOOPS = (['mixed', 'light damping', 'integrators', 'unstable poles', 'sampled', 'dead time'] as const)
  .flatMap(family => Array.from({ length: 8 }, (_, seed) => ({ name: `${family} ${2000 + seed}`, input: generateLoop(family, 2000 + seed).input as ZerosPolesInput })))

/** |1 + c L| at w. */
function distanceAfter(input: ZerosPolesInput, w: number, gain: number, turn: number): number {
  const value = new Float64Array(2)
  prepareLoopGain(input).evaluate(w, value)
  const [re, im] = [gain * Math.cos(turn), gain * Math.sin(turn)]
  return Math.hypot(1 + value[0]! * re - value[1]! * im, value[0]! * im + value[1]! * re)
}

describe('every margin, taken, brings L to -1', () => {
  it('a gain margin puts the locus on -1 at its phase crossover', () => {
    for (const { name, input } of LOOPS) {
      for (const { frequency, gainMargin } of analyseLoop(input).phaseCrossovers) {
        if (frequency === 'infinity' || frequency === 0) continue
        expect(distanceAfter(input, frequency, 10 ** (gainMargin / 20), 0), `${name} at ${frequency}`).toBeLessThan(1e-6)
      }
    }
  })

  it('a phase margin, as lag or lead, does at its gain crossover, and so does the delay margin', () => {
    for (const { name, input } of LOOPS) {
      for (const { frequency, phaseMargin, delayMargin } of analyseLoop(input).gainCrossovers) {
        expect(distanceAfter(input, frequency, 1, -phaseMargin * Math.PI / 180), `${name} at ${frequency}`).toBeLessThan(1e-7)
        expect(distanceAfter(input, frequency, 1, -frequency * delayMargin), `${name} at ${frequency}`).toBeLessThan(1e-7)
      }
    }
  })

  it('the simultaneous change of a closest approach does at its frequency', () => {
    for (const { name, input } of LOOPS) {
      for (const { frequency, distance, gainChange, phaseChange } of analyseLoop(input).closestApproaches) {
        expect(distanceAfter(input, frequency, 10 ** (gainChange / 20), phaseChange * Math.PI / 180), `${name} at ${frequency}`).toBeLessThan(1e-6)
        const stated = Math.abs(distanceAfter(input, frequency, 1, 0) - distance)
        expect(stated, `${name} at ${frequency}`).toBeLessThan(1e-8 * Math.max(1, distance))
      }
    }
  })

  it('crossing a gain margin changes the number of unstable closed-loop poles by exact count, and nothing short of it does', () => {
    for (const { name, input } of LOOPS.filter(l => l.input.deadTime === undefined)) {
      const margins = analyseLoop({ ...input, gainFloor: -200 }).phaseCrossovers.map(p => p.gainMargin).sort((a, b) => a - b)
      const counts = (dB: number) => exactAnswer({ ...input, gain: input.gain * 10 ** (dB / 20) }).closedLoopUnstablePoles
      const distinct = margins.filter((m, i) => i === 0 || m - margins[i - 1]! > 1e-3)
      for (const margin of distinct) expect(counts(margin - 4e-4), `${name}, ${margin} dB`).not.toBe(counts(margin + 4e-4))
      const up = margins.find(m => m > 0)
      const down = margins.filter(m => m < 0).at(-1)
      const now = counts(0)
      if (up !== undefined) expect(counts(up * 0.999), name).toBe(now)
      if (down !== undefined) expect(counts(down * 0.999), name).toBe(now)
    }
  })
})
