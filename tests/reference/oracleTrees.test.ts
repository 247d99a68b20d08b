import { describe, expect, it } from 'vitest'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import { readLoopInput } from '#shared/analysis/readLoopInput'
import { compareWithRationalTree } from '../oracle/compareWithRationalTree'
import { compareWithTree } from '../oracle/compareWithTree'
import { exactAnswer } from '../oracle/exactAnswer'
import type { OracleCoefficients } from '../oracle/ExactLoop'
import { generateLoop } from '../oracle/generateLoop'
import { generateRationalTree, RATIONAL_TREE_FAMILIES } from '../oracle/generateRationalTree'
import { generateTree, TREE_FAMILIES } from '../oracle/generateTree'
import { polynomial, quotient } from '../oracle/LoopTree'
import { treeAnswer } from '../oracle/treeAnswer'

const analyse = (input: unknown) => analyseLoop(readLoopInput(input))
const LOOPS = 25

describe('the enclosing oracle, held against the exact one first', () => {
  it('finds the same on 20 loops without dead time', () => {
    for (let seed = 0; seed < 20; seed += 1) {
      const { input, gainFloor } = generateLoop('coefficients', seed, [2, 6])
      const { numerator, denominator } = input as OracleCoefficients
      const enclosed = treeAnswer(quotient(polynomial(numerator), polynomial(denominator)), [0.01, 100], gainFloor)
      const exact = exactAnswer(input, gainFloor)
      expect(enclosed.open, `seed ${seed}`).toEqual([])
      for (const list of ['gainCrossovers', 'phaseCrossovers', 'closestApproaches'] as const) {
        const inside = exact[list].map(f => Number(f.frequency)).filter(w => w > 0.01 && w < 100)
        expect(enclosed[list].map(f => Number(f.frequency).toPrecision(8)), `${list}, seed ${seed}`).toEqual(inside.map(w => w.toPrecision(8)))
      }
    }
  })
})

/**
 * Expressions with several dead times against interval arithmetic on the tree, between 0.01 and 1000 rad/s and above -40 dB. The verdict is held against loops with one
 * dead time that have the same characteristic function; for three dead times it is not covered.
 */
describe('typed loops with several dead times', () => {
  for (const family of TREE_FAMILIES) {
    it(`${family}: ${LOOPS} seeded loops, the same sets, values and verdict, all proven`, () => {
      for (let seed = 0; seed < LOOPS; seed += 1) {
        const { differences, exceptions, setAside } = compareWithTree(generateTree(family, seed), analyse)
        expect({ differences, exceptions, setAside }, `seed ${seed}`).toEqual({ differences: [], exceptions: [], setAside: [] })
      }
    })
  }
})

/** Expressions in s and z without dead time: exact, the tree multiplied out in big integers. */
describe('typed rational loops', () => {
  for (const family of RATIONAL_TREE_FAMILIES) {
    it(`${family}: ${LOOPS} seeded loops, the same sets, values and counts, all proven`, () => {
      for (let seed = 0; seed < LOOPS; seed += 1) {
        const { differences, exceptions, setAside } = compareWithRationalTree(generateRationalTree(family, seed), analyse)
        expect({ differences, exceptions, setAside }, `seed ${seed}`).toEqual({ differences: [], exceptions: [], setAside: [] })
      }
    })
  }
})
