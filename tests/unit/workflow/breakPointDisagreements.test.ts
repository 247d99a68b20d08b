import { describe, expect, it } from 'vitest'
import { breakPointDisagreements, cellKey, type BreakPointFacts } from '#shared/workflow/breakPointDisagreements'
import type { ClosedLoopVerdict } from '#shared/types/analysis'
import type { OtherLoopState } from '#shared/types/system'

const closed = (loopId: number): OtherLoopState => ({ loopId, state: 'closed' })
const open = (loopId: number): OtherLoopState => ({ loopId, state: 'open' })
const held = (loopId: number, gain?: number): OtherLoopState => ({ loopId, state: 'held', ...gain === undefined ? {} : { gain } })
const loop = (id: number, code: string, ...loopStates: OtherLoopState[]) => ({ id, code, loopStates })
const cell = (loopId: number, verdict: ClosedLoopVerdict | null, conditionId = 1): BreakPointFacts['cells'][number] =>
  ({ loopId, conditionId, analysis: verdict === null ? null : { stability: { verdict } } })

describe('break points of one closed system', () => {
  it('nothing contradicts without loops, without cells, and where a loop lists itself', () => {
    expect(breakPointDisagreements({ loops: [], cells: [] }).size).toBe(0)
    expect(breakPointDisagreements({ loops: [loop(1, 'A', closed(2)), loop(2, 'B', closed(1))], cells: [] }).size).toBe(0)
    expect(breakPointDisagreements({ loops: [loop(1, 'A', closed(1))], cells: [cell(1, 'stable'), cell(1, 'unstable', 2)] }).size).toBe(0)
  })

  it('a stable and an unstable verdict of one closed system are told at both cells, each with the other loop and both verdicts', () => {
    const found = breakPointDisagreements({ loops: [loop(1, 'SL-R', closed(2)), loop(2, 'SL-P', closed(1))], cells: [cell(1, 'stable'), cell(2, 'unstable')] })
    expect([...found]).toEqual([
      [cellKey(1, 1), 'Opened here the closed loop is stable, opened at SL-P the same closed loop is unstable: check the sign of the feedback, the loop gains and the stated states of both.'],
      [cellKey(2, 1), 'Opened here the closed loop is unstable, opened at SL-R the same closed loop is stable: check the sign of the feedback, the loop gains and the stated states of both.'],
    ])
  })

  it('only conditions in which they differ are told', () => {
    const found = breakPointDisagreements({
      loops: [loop(1, 'A', closed(2)), loop(2, 'B', closed(1))],
      cells: [cell(1, 'stable', 7), cell(2, 'stable', 7), cell(1, 'stable', 8), cell(2, 'marginal', 8), cell(1, 'stable', 9)],
    })
    expect([...found.keys()]).toEqual(['1 8', '2 8'])
  })

  it.each<[ClosedLoopVerdict | null, ClosedLoopVerdict | null]>([
    ['stable', 'stable'], ['unstable', 'marginal'], ['undetermined', 'unstable'], ['stable', 'undetermined'], ['stable', null], [null, null],
  ])('%s and %s do not contradict', (first, second) => {
    expect(breakPointDisagreements({ loops: [loop(1, 'A', closed(2)), loop(2, 'B', closed(1))], cells: [cell(1, first), cell(2, second)] }).size).toBe(0)
  })

  it.each([
    ['one does not state the other closed', loop(1, 'A', closed(2)), loop(2, 'B')],
    ['one states the other open', loop(1, 'A', closed(2)), loop(2, 'B', open(1))],
    ['a third is open for one and at nominal for the other', loop(1, 'A', closed(2), open(3)), loop(2, 'B', closed(1))],
    ['a third is held at different gains', loop(1, 'A', closed(2), held(3, 0.5)), loop(2, 'B', closed(1), held(3, 0.6))],
    ['a third is held at a gain for one and at none stated for the other', loop(1, 'A', closed(2), held(3, 0.5)), loop(2, 'B', closed(1), held(3))],
  ])('they are not one closed system where %s', (_, one, other) => {
    expect(breakPointDisagreements({ loops: [one, other, loop(3, 'C')], cells: [cell(1, 'stable'), cell(2, 'unstable'), cell(3, 'stable')] }).size).toBe(0)
  })

  it('three break points of one closed system: the one that differs is told by both others', () => {
    const found = breakPointDisagreements({
      loops: [loop(1, 'A', closed(2), closed(3)), loop(2, 'B', closed(3), closed(1)), loop(3, 'C', closed(1), closed(2))],
      cells: [cell(1, 'stable'), cell(2, 'stable'), cell(3, 'unstable')],
    })
    expect([...found.keys()].sort()).toEqual(['1 1', '2 1', '3 1'])
    expect(found.get('3 1')).toMatch(/opened at A .*stable.* opened at B/)
    expect(found.get('1 1')).not.toContain('opened at B')
  })

  it('third loops of equal states leave it one closed system, in whatever order they are listed', () => {
    const found = breakPointDisagreements({
      loops: [loop(1, 'A', closed(2), open(3), held(4, 0.5)), loop(2, 'B', held(4, 0.5), open(3), closed(1))],
      cells: [cell(1, 'stable'), cell(2, 'unstable')],
    })
    expect(found.size).toBe(2)
  })
})
