import { describe, expect, it } from 'vitest'
import { compareSnapshots } from '#shared/comparison/compareSnapshots'
import { buildSnapshot } from '../../factories/buildSnapshot'

describe('break points of two frozen states', () => {
  const { loops } = buildSnapshot()

  it('a state frozen before blocks and one in which nothing was stated of them are the same', () => {
    const stated = buildSnapshot({ loops: loops.map(loop => ({ ...loop, breakAt: null, loopStates: [] })) })
    expect(compareSnapshots(buildSnapshot(), stated).breakPointChanges).toEqual([])
    expect(compareSnapshots(stated, buildSnapshot()).breakPointChanges).toEqual([])
  })

  it('a loop that only one of them has is told among the loops, not here', () => {
    expect(compareSnapshots(buildSnapshot({ loops: loops.slice(0, 1) }), buildSnapshot()).breakPointChanges).toEqual([])
  })

  it('another block, side, state or gain is told by the title lines before and after', () => {
    const first = loops[0]!
    const at = (gain: number) => buildSnapshot({ loops: [{ ...first, otherLoops: '', breakAt: { block: 'C', side: 'output' }, loopStates: [{ code: 'SL-P', state: 'held', gain }] }, loops[1]!] })
    expect(compareSnapshots(buildSnapshot(), at(0.5)).breakPointChanges).toEqual([
      'SL-R: opened at valve command; slew position open to opened at the output of C (valve command); SL-P held at gain 0.5, all others at nominal'])
    expect(compareSnapshots(at(0.5), at(0.6)).breakPointChanges).toHaveLength(1)
    expect(compareSnapshots(at(0.5), at(0.5)).breakPointChanges).toEqual([])
  })
})
