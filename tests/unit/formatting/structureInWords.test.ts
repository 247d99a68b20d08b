import { describe, expect, it } from 'vitest'
import { describeAccuracy } from '#shared/formatting/describeAccuracy'
import { describeApproximation } from '#shared/formatting/describeApproximation'
import { describeBreakPoint } from '#shared/formatting/describeBreakPoint'
import { describeClosedLoopPole } from '#shared/formatting/describeClosedLoopPole'
import { describeStructureNote } from '#shared/formatting/describeStructureNote'
import { gainDecreaseCaution } from '#shared/formatting/gainDecreaseCaution'
import { listInWords } from '#shared/formatting/listInWords'

describe('where a loop is opened', () => {
  const facts = { breakPoint: '', otherLoops: '', states: [] }

  it('says that nothing is said', () => {
    expect(describeBreakPoint(facts)).toBe('not said where it is opened; one path at a time, all others at nominal')
  })

  it('names block, side, signal and the state of every other loop', () => {
    expect(describeBreakPoint({
      breakPoint: ' servo valve command ', breakAt: { block: 'C', side: 'output' }, otherLoops: '',
      states: [{ code: 'SL-P', state: 'open' }, { code: 'LU-R', state: 'held', gain: 0.5 }], loopCount: 4,
    })).toBe('opened at the output of C (servo valve command); SL-P open, LU-R held at gain 0.5, all others at nominal')
  })

  it('speaks of no others where all are stated, and adds what was said in words', () => {
    expect(describeBreakPoint({ breakPoint: '', breakAt: { block: 'G', side: 'input' }, otherLoops: 'boom parked', states: [{ code: 'SL-P', state: 'closed' }], loopCount: 2 }))
      .toBe('opened at the input of G; SL-P closed; boom parked')
  })

  it('takes words alone as they are, as before there were blocks', () => {
    expect(describeBreakPoint({ ...facts, breakPoint: 'valve command', breakAt: null, otherLoops: 'slew position open' })).toBe('opened at valve command; slew position open')
  })

  it('a held loop without a gain, and with a long one', () => {
    expect(describeBreakPoint({ ...facts, states: [{ code: 'A', state: 'held' }, { code: 'B', state: 'held', gain: 1 / 3 }] }))
      .toBe('not said where it is opened; A held, B held at gain 0.3333, all others at nominal')
  })
})

describe('cautions and notes', () => {
  it('every finite margin against falling gain carries its caution', () => {
    expect([null, { gainDecrease: null }, { gainDecrease: -6.0599 }, { gainDecrease: 0 }].map(gainDecreaseCaution)).toEqual([
      null, null, 'gain falls in saturation or at start-up: 6.1 dB left', 'gain falls in saturation or at start-up: 0.00 dB left'])
  })

  it('an accuracy is rounded upwards to one digit', () => {
    const of = (relative: number) => describeAccuracy({ approximated: false, notes: [], accuracy: { relative, basis: 'built from state space' } })
    expect([2.31e-13, 3e-13, 9.2e-14, 0].map(of)).toEqual([
      'built from state space: relative error on the axis below 3e-13', 'built from state space: relative error on the axis below 3e-13',
      'built from state space: relative error on the axis below 1e-13', 'built from state space: relative error on the axis none'])
    expect(of(Infinity)).toBe('built from state space: relative error on the axis not bounded')
    expect([describeAccuracy(undefined), describeAccuracy({ approximated: true, notes: [] })]).toEqual([null, null])
  })

  it('an approximation is told as more or less lag and gain', () => {
    expect([{ gain: -0.2, phase: -3.4 }, { gain: 0.31, phase: 12 }, { gain: 0, phase: -4.25 }, { gain: -1.2, phase: 0.001 }, { gain: 0, phase: -0 }]
      .map(difference => describeApproximation({ ...difference, distance: 0 }))).toEqual([
      'approximation: lag 3.40 deg more, 0.20 dB less', 'approximation: lag 12.0 deg less, 0.31 dB more', 'approximation: lag 4.25 deg more',
      'approximation: 1.2 dB less', 'approximation: the same'])
  })

  it('a note carries its block, one of the loop none', () => {
    expect(['G', ''].map(block => describeStructureNote({ block, code: 'unreachable', message: 'Two states cannot be reached.' })))
      .toEqual(['G: Two states cannot be reached.', 'Two states cannot be reached.'])
  })

  it('a list is joined in words', () => {
    expect([[], ['C1'], ['C1', 'C2'], ['C1', 'C2', 'C4']].map(listInWords)).toEqual(['', 'C1', 'C1 and C2', 'C1, C2 and C4'])
  })
})

describe('a closed-loop pole as a row', () => {
  it('decaying, growing, on the boundary and dead beat', () => {
    expect(describeClosedLoopPole({ re: -0.25, im: 12.29, frequency: 12.3, damping: 0.0203, timeConstant: 4, mode: 'bending 1 of G' }, 'rad/s'))
      .toEqual({ frequency: '12.30 rad/s', damping: '0.0203', timeConstant: '4.00 s', mode: 'bending 1 of G' })
    expect(describeClosedLoopPole({ re: 0.25, im: 12.29, frequency: 12.3, damping: -0.0203, timeConstant: -4, mode: null }))
      .toEqual({ frequency: '12.30', damping: 'minus 0.0203', timeConstant: 'grows by e in 4.00 s', mode: 'not told' })
    expect(describeClosedLoopPole({ re: 0, im: 2, frequency: 2, damping: -0, timeConstant: null, mode: null }, 'Hz'))
      .toEqual({ frequency: '2.000 Hz', damping: '0', timeConstant: 'neither decays nor grows', mode: 'not told' })
    expect(describeClosedLoopPole({ re: -0.59, im: 71.6, frequency: 71.6, damping: 0.008281, timeConstant: 1.68, mode: null }).damping).toBe('0.00828')
    expect(describeClosedLoopPole({ re: 3, im: 0, frequency: 3, damping: -1, timeConstant: -1 / 3, mode: null }, 'rad/s').damping).toBe('minus 1')
    expect(describeClosedLoopPole({ re: -36, im: 0, z: [0, 0], frequency: 36, damping: 1, timeConstant: 1 / 36, mode: 'dead time' }, 'rad/s'))
      .toEqual({ frequency: 'dead beat', damping: '1', timeConstant: 'settles within a sample', mode: 'dead time' })
  })
})
