import { describe, expect, it } from 'vitest'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import { readLoopInput } from '#shared/analysis/readLoopInput'
import type { ComplexPair, ExpressionInput } from '#shared/types/analysis'
import type { BlockGain, ZerosPolesGain } from '#shared/types/block'
import { zerosPolesOf } from '../oracle/exactRoots'
import { checkLoops, type CheckLoop } from './checkLoop'
import { expectCrossings, expectDistances, expectVerdict, TIES } from './expectLoop'

const floorOf = (loop: CheckLoop) => loop.delay > 0 ? -60 : -120

/** Real roots and conjugate pairs, each by itself. */
function groupsOf(roots: ComplexPair[]): ComplexPair[][] {
  return roots.filter(([, im]) => im >= 0).map(([re, im]): ComplexPair[] => im === 0 ? [[re, 0]] : [[re, im], [re, -im]])
}

/** The loop's dead time as a block: a factor in seconds, or, sampled, whole samples. */
function delayOf(loop: CheckLoop): Record<string, BlockGain> {
  return loop.delay > 0 ? { D: { kind: 'deadTime', deadTime: loop.delay, unit: 's' } } : {}
}

/** A controller and a plant by their factors: poles to each in turn, zeros to the controller as far as it stays proper. */
function byFactors(loop: CheckLoop): ExpressionInput {
  const timing = loop.Ts === null ? {} : { sampleTime: loop.Ts }
  const { zeros, poles, gain } = zerosPolesOf({ numerator: loop.num, denominator: loop.den })
  const C: ZerosPolesGain = { kind: 'zerosPoles', zeros: [], poles: [], gain, ...timing }
  const G: ZerosPolesGain = { kind: 'zerosPoles', zeros: [], poles: [], gain: 1, ...timing }
  groupsOf(poles).forEach((group, i) => (i % 2 === 0 ? C : G).poles.push(...group))
  for (const group of groupsOf(zeros)) (C.zeros.length + group.length <= C.poles.length ? C : G).zeros.push(...group)
  // what would leave the plant improper goes over as a whole
  const blocks: Record<string, BlockGain> = G.zeros.length > G.poles.length
    ? { Q: { ...C, zeros, poles }, ...delayOf(loop) }
    : { C, G, ...delayOf(loop) }
  return { expression: Object.keys(blocks).join('*'), blocks }
}

/** The whole as one block of coefficients, over a gain that a parameter takes back. */
function byCoefficients(loop: CheckLoop): ExpressionInput {
  const P: BlockGain = { kind: 'coefficients', numerator: loop.num, denominator: loop.den, ...loop.Ts === null ? {} : { sampleTime: loop.Ts } }
  const blocks = { P, Q: { kind: 'expression' as const, expression: 'P/4' }, ...delayOf(loop) }
  return { expression: loop.delay > 0 ? '(k*Q)*D' : 'k*Q', blocks, parameters: { k: 4 } }
}

describe('the textbook loops built from blocks', () => {
  for (const loop of checkLoops) {
    for (const [form, input] of Object.entries({ 'a controller and a plant by their factors': byFactors(loop), 'a block of a block of coefficients': byCoefficients(loop) })) {
      it(`${loop.id} from ${form}: every crossing, distance, peak and count as computed (${loop.source}; ${loop.confirmation})`, () => {
        const floor = floorOf(loop)
        const analysis = analyseLoop(readLoopInput({ ...input, gainFloor: floor }))
        expectVerdict(analysis, loop)
        expectCrossings(analysis, loop, floor)
        expectDistances(analysis, loop)
        expect(analysis.structure).toEqual({ ...loop.Ts !== null && { sampleTime: loop.Ts }, approximated: false, notes: [] })
        if (!(loop.id in TIES)) expect(analysis.coverage).toMatchObject({ proven: true, exceptions: [] })
      })
    }
  }
})
