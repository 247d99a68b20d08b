import { describe, expect, it } from 'vitest'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import type { LoopAnalysis } from '#shared/types/analysis'
import type { BlockGain, ModalGain, StateSpaceGain } from '#shared/types/block'
import { companion, parallel, rotated, skewed, stateSpace } from './coordinates'

/** 29 modes of a structure from 3 to about 1200 rad/s, 20 of damping 0.2 to 0.5 %, and a rigid body: 60 states. */
const frequencies = Array.from({ length: 29 }, (_, k) => Number((3 * 1.24 ** k).toPrecision(6)))
const dampings = frequencies.map((_, k) => k < 20 ? Number((0.002 + 0.003 * ((7 * k) % 20) / 19).toPrecision(4)) : 0.02)
const gainsIn = frequencies.map((_, k) => [0.6, -0.4, 0.9, 0.5, -0.7][k % 5]!)
const gainsOut = frequencies.map((_, k) => [0.5, 0.8, 0.6, -0.3][k % 4]!)

const table: ModalGain = {
  kind: 'modal', frequencyUnit: 'rad/s', derivative: 0, inputs: [], outputs: [],
  modes: frequencies.map((frequency, k) => ({ name: `mode ${k + 1}`, frequency, damping: dampings[k]!, gainIn: [gainsIn[k]!], gainOut: [gainsOut[k]!] })),
  rigid: [{ power: -2, gainIn: [1], gainOut: [1] }],
}

/** The same in states: position and rate of the rigid body, position and rate over frequency of each mode. */
const states: StateSpaceGain = parallel(companion([1], [0, 0, 1]), ...frequencies.map((w, k) =>
  stateSpace([[0, w], [-w, -2 * dampings[k]! * w]], [[0], [gainsIn[k]!]], [[gainsOut[k]! / w, 0]])))

/** Position and rate themselves: entries up to w^2. */
const physical: StateSpaceGain = parallel(companion([1], [0, 0, 1]), ...frequencies.map((w, k) =>
  stateSpace([[0, 1], [-w * w, -2 * dampings[k]! * w]], [[0], [gainsIn[k]!]], [[gainsOut[k]!, 0]])))

const analysed = (gain: BlockGain): LoopAnalysis => analyseLoop({
  expression: 'C*G', gainFloor: -60,
  blocks: { C: { kind: 'expression', expression: '2*(s + 0.3)/(s/20 + 1)/(s/40 + 1)' }, G: gain },
})

function expectSame(found: LoopAnalysis, wanted: LoopAnalysis, frequency: number, margin: number, distance: number): void {
  expect(found.gainCrossovers).toHaveLength(wanted.gainCrossovers.length)
  expect(found.phaseCrossovers).toHaveLength(wanted.phaseCrossovers.length)
  expect(found.closestApproaches).toHaveLength(wanted.closestApproaches.length)
  const near = (a: number | string, b: number | string) => expect(Math.abs(Number(a) / Number(b) - 1)).toBeLessThan(frequency)
  wanted.gainCrossovers.forEach((entry, k) => {
    near(found.gainCrossovers[k]!.frequency, entry.frequency)
    expect(Math.abs(found.gainCrossovers[k]!.phaseMargin - entry.phaseMargin)).toBeLessThan(margin)
  })
  wanted.phaseCrossovers.forEach((entry, k) => {
    near(found.phaseCrossovers[k]!.frequency, entry.frequency)
    expect(Math.abs(found.phaseCrossovers[k]!.gainMargin - entry.gainMargin)).toBeLessThan(margin)
  })
  wanted.closestApproaches.forEach((entry, k) => {
    near(found.closestApproaches[k]!.frequency, entry.frequency)
    expect(Math.abs(found.closestApproaches[k]!.distance - entry.distance)).toBeLessThan(distance)
  })
  expect(Math.abs(found.vectorMargin!.distance - wanted.vectorMargin!.distance)).toBeLessThan(distance)
  expect(found.stability.verdict).toBe(wanted.stability.verdict)
  expect(found.stability.closedLoopUnstablePoles).toBe(wanted.stability.closedLoopUnstablePoles)
}

describe('a plant of 60 states with 20 lightly damped modes', () => {
  const wanted = analysed(table)

  it('is the same loop as its modal table: many crossings, all proven', () => {
    expect(wanted.gainCrossovers.length + wanted.phaseCrossovers.length).toBeGreaterThan(30)
    expect(wanted.coverage.proven).toBe(true)
  })

  it.each([
    ['position and rate over frequency', states],
    ['position and rate', physical],
    ['states mixed by a rotation', rotated(states, 41)],
  ])('agrees with it to 1e-9 in frequency, 1e-6 dB and deg, 1e-9 in distance, and is proven: %s', (_, gain) => {
    const found = analysed(gain)
    expect(found.coverage.proven).toBe(true)
    expect(found.structure!.accuracy!.relative).toBeLessThan(1e-12)
    expect(found.structure!.accuracy!.basis).toContain('60 states')
    expectSame(found, wanted, 1e-9, 1e-6, 1e-9)
  })
})

describe('a loop over a state space', () => {
  it('keeps a cancelled unstable mode in its verdict and names the block', () => {
    // an unstable state that the input does not reach, mixed into a stable one
    const gain = rotated(stateSpace([[-1, 0], [0, 2]], [[1], [0]], [[1, 1]]), 3)
    const { stability, structure } = analyseLoop({ expression: 'G', blocks: { G: gain } })
    expect(stability.verdict).toBe('unstable')
    expect(stability.openLoopUnstablePoles).toBe(1)
    expect(structure!.notes.map(note => [note.block, note.code])).toEqual(expect.arrayContaining([['G', 'unreachable'], ['G', 'hidden unstable']]))
  })

  it('stabilises an unstable one that is reached and seen', () => {
    // 10/(s^2 - 4) with (s + 3): closed loop s^2 + 10 s + 26
    const { stability, coverage } = analyseLoop({ expression: '(s + 3)/(s/100 + 1)*G', blocks: { G: rotated(companion([10], [-4, 0, 1]), 5) } })
    expect([stability.verdict, stability.openLoopUnstablePoles, coverage.proven]).toEqual(['stable', 1, true])
  })

  it('of several channels is the loop that remains when the others are closed', () => {
    // G = diag(1/(s+1), 1/(s+2)) mixed by [[2, 1], [1, 1]] at the output, second loop closed by 3:
    // G11 - G12 3 G21/(1 + 3 G22) with G11 = 2/(s+1), G12 = 1/(s+2), G21 = 1/(s+1), G22 = 1/(s+2): (2 - 3/(s+5))/(s+1) = (2s + 7)/((s + 1)(s + 5))
    const gain = rotated(stateSpace([[-1, 0], [0, -2]], [[1, 0], [0, 1]], [[2, 1], [1, 1]]), 11)
    const found = analyseLoop({ expression: '4*(G[1,1] - G[1,2]*K*G[2,1]/(1 + K*G[2,2]))', blocks: { G: gain, K: { kind: 'expression', expression: '3' } } })
    const wanted = analyseLoop({ expression: '4*(2*s + 7)/((s + 1)*(s + 5))' })
    expect(found.coverage.proven).toBe(true)
    expectSame(found, wanted, 1e-9, 1e-6, 1e-9)
  })

  it('in z is sampled at its rate', () => {
    const gain = { ...rotated(companion([0.1, 0.2], [0.7, -1.5, 1]), 4), sampleTime: 0.01 }
    const found = analyseLoop({ expression: 'G', sampleTime: 0.01, blocks: { G: gain } })
    const wanted = analyseLoop({ expression: '(0.2*z + 0.1)/(z^2 - 1.5*z + 0.7)', sampleTime: 0.01 })
    expect(found.structure!.sampleTime).toBe(0.01)
    expectSame(found, wanted, 1e-9, 1e-6, 1e-9)
  })

  it('in coordinates too badly conditioned to tell where its integrators are is not proven, and says why', () => {
    const gain = skewed(parallel(companion([1], [0.05, 1]), companion([0.3], [0, 0, 1])), 3, 3)
    const { coverage, structure } = analyseLoop({ expression: '(s + 0.1)*G', blocks: { G: gain } })
    expect(structure!.accuracy!.relative).toBeGreaterThan(1e-9)
    expect(coverage.proven).toBe(false)
    expect(coverage.exceptions[0]).toMatchObject({ from: 0, to: 'infinity', code: 'accuracy' })
    expect(coverage.exceptions[0]!.reason).toContain('compared with the matrices themselves')
  })

  it('is zero, and refused, where no path joins input and output', () => {
    expect(() => analyseLoop({ expression: 'G', blocks: { G: stateSpace([[-1]], [[0]], [[1]]) } })).toThrow('zero')
  })
})
