// A loop over a state space, on one thread: the first time a block is met (reduction, poles, zeros, check) and again, when its model is known.
import { analyseLoop } from '#shared/analysis/analyseLoop'
import { lowerExpression } from '#shared/analysis/expressions/lowerExpression'
import type { ComplexPair, LoopAnalysis } from '#shared/types/analysis'
import type { StateSpaceGain } from '#shared/types/block'
import { mode, parallel, rotated, stateSpace } from '../../tests/unit/analysis/stateSpace/coordinates'
import { plainEvaluation } from './engine/plainEvaluation'
import { leastMilliseconds, logSpaced } from './engine/timing'

const POINTS = 10_000
const ROUNDS = 5

/** Lightly damped modes from 2 rad/s upwards and real poles, the states mixed by a rotation; `round` makes each a block that was not met before. */
function structure(modes: number, lags: number, spacing: number, round: number): StateSpaceGain {
  const parts = Array.from({ length: modes }, (_, k) => mode(2 * spacing ** k * (1 + 1e-6 * round), 0.002 + 0.003 * ((7 * k) % 10) / 10, [1, 0.6, 0.8][k % 3]!))
  for (let k = 0; k < lags; k++) parts.push(stateSpace([[-0.3 * 1.2 ** k]], [[0.5]], [[[0.2, -0.1][k % 2]!]]))
  return rotated(parallel(...parts), 17)
}

function bench(states: number, modes: number, spacing: number): void {
  const gains = Array.from({ length: ROUNDS }, (_, round) => structure(modes, states - 2 * modes, spacing, round))
  const input = (gain: StateSpaceGain) => ({ expression: '0.3*(s + 2)/(s/50 + 1)*G', blocks: { G: gain } })
  let analysis!: LoopAnalysis
  const first = gains.map(gain => leastMilliseconds(() => {
    analysis = analyseLoop(input(gain))
  }, 1))
  const again = leastMilliseconds(() => analyseLoop(input(gains[0]!)), ROUNDS)
  const lowered = lowerExpression(input(gains[0]!))
  if (lowered.kind !== 'factored') throw new Error('A state space is a product of factors.')
  const pairs = ({ re, im }: { re: Float64Array, im: Float64Array }) => Array.from(re, (value, k): ComplexPair => [value, im[k]!])
  const plain = plainEvaluation({ zeros: pairs(lowered.loop.zeros), poles: pairs(lowered.loop.poles), gain: lowered.loop.gain })
  const frequencies = logSpaced(1e-2, 1e4, POINTS)
  const evaluation = leastMilliseconds(() => plain(frequencies), ROUNDS)
  const finds = analysis.gainCrossovers.length + analysis.phaseCrossovers.length + analysis.closestApproaches.length
  const least = Math.min(...first)
  console.log(`  ${states} states, ${modes} modes, ${finds} finds, ${analysis.coverage.proven ? 'proven' : 'not proven'}: first ${first[0]!.toFixed(0)} ms, then ${least.toFixed(0)} ms a new block (goal: under 1000), ${again.toFixed(0)} ms a known one`)
  console.log(`    over its factors at ${POINTS} points: ${(least / evaluation).toFixed(1)} new, ${(again / evaluation).toFixed(1)} known; accuracy ${analysis.structure!.accuracy!.relative.toExponential(0)}: ${analysis.structure!.accuracy!.basis}`)
}

bench(60, 20, 1.3)
bench(150, 60, 1.12)
