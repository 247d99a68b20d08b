import { describe, expect, it } from 'vitest'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import { readLoopInput } from '#shared/analysis/readLoopInput'
import { compareWithOracle } from '../oracle/compareWithOracle'
import { generateLoop, type LoopFamily } from '../oracle/generateLoop'

/** Loops on which the engine once differed from exact arithmetic: [what was wrong, family, seed, orders]. */
const FOUND: [string, LoopFamily, number, [number, number]][] = [
  ['a closed-loop pole 6e-10 off the axis was taken as on it, and the verdict withheld', 'undamped modes', 1079, [2, 9]],
  ['the same', 'undamped modes', 1037, [2, 9]],
  ['the same, of order 21', 'undamped modes', 6, [10, 24]],
  ['the peak of |T| below the first box, beside an integrator, was missed', 'integrators', 1159, [2, 9]],
  ['a disk margin of 5e-9 lost all its digits', 'twelve decades', 18, [2, 9]],
  ['the arc about a double pole at z = -1 was swept on the wrong side: stable was said of an unstable loop', 'sampled whole numbers', 166, [2, 9]],
  ['the same, with the roots of the closed loop to contradict it', 'sampled whole numbers', 50, [2, 9]],
  ['the limit of the phase at a triple undamped pair, exactly 180 deg, was taken with the error of its series', 'repeated roots', 50185, [2, 9]],
  ['the same for a sampled loop: three unstable poles told where there is one', 'sampled whole numbers', 50085, [2, 9]],
  ['half a sample of dead time: L(-1), which is imaginary, was taken for 0 and a closest approach beside it lost', 'sampled whole numbers with dead time', 50074, [2, 9]],
]

describe('what the oracle has found stays mended', () => {
  for (const [what, family, seed, orders] of FOUND) {
    it(`${what} (${family} ${seed})`, () => {
      const { differences, exceptions } = compareWithOracle(generateLoop(family, seed, orders), input => analyseLoop(readLoopInput(input)))
      expect({ differences, exceptions }).toEqual({ differences: [], exceptions: [] })
    })
  }
})
