import { describe, expect, it } from 'vitest'
import { compareSnapshots } from '#shared/comparison/compareSnapshots'
import type { BlockGain } from '#shared/types/block'
import type { SnapshotBlock } from '#shared/types/snapshot'
import { buildAnalysis, buildCell, buildSnapshot } from '../../factories/buildSnapshot'

const lag = (pole: number): BlockGain & SnapshotBlock['definitions'][string] => ({ kind: 'expression', expression: `1/(s+${pole})` })
const block = (name: string, definitions: SnapshotBlock['definitions'], change: Partial<SnapshotBlock> = {}): SnapshotBlock =>
  ({ name, role: 'filter', unitIn: 'V', unitOut: 'V', notes: '', definitions, ...change })
const using = (loop: string, ...names: string[]) => ['C1', 'C2'].map(condition =>
  buildCell(loop, condition, buildAnalysis(), { input: { expression: names.join('*'), blocks: Object.fromEntries(names.map(name => [name, lag(1)])) } }))

describe('changes of blocks between two frozen states', () => {
  it('two states without blocks have none, as those frozen before there were blocks', () => {
    expect(compareSnapshots(buildSnapshot(), buildSnapshot()).blockChanges).toEqual([])
    expect(compareSnapshots(buildSnapshot(), buildSnapshot({ blocks: [] })).blockChanges).toEqual([])
  })

  it('names those added and removed with the loops that use them', () => {
    const before = buildSnapshot({ blocks: [block('F', { C1: lag(1), C2: lag(1) })], cells: using('SL-R', 'F') })
    const after = buildSnapshot({ blocks: [block('G', { C1: lag(1) }, { role: 'plant' })], cells: [...using('SL-R', 'G'), ...using('SL-P', 'G')] })
    expect(compareSnapshots(before, after).blockChanges).toEqual(['block G (plant) added; used by SL-R and SL-P', 'block F (filter) removed; used by SL-R'])
    expect(compareSnapshots(buildSnapshot(), after).blockChanges).toEqual(['block G (plant) added; used by SL-R and SL-P'])
  })

  it('tells in which conditions a gain changed, came and went, to the last digit', () => {
    const before = buildSnapshot({ blocks: [block('F', { C1: lag(1) }), block('H', { C1: lag(1), C2: lag(1) }), block('K', { C1: lag(2), C2: lag(2) })] })
    const after = buildSnapshot({ blocks: [block('F', { C1: lag(1 + Number.EPSILON), C2: lag(3) }), block('H', { C1: lag(1) }), block('K', { C1: lag(3), C2: lag(3) })] })
    expect(compareSnapshots(before, after).blockChanges).toEqual([
      'block F (filter): gain changed in C1, gain added in C2; used by no loop',
      'block H (filter): gain removed in C2; used by no loop',
      'block K (filter): gain changed in every condition; used by no loop',
    ])
  })

  it('tells role, units and notes', () => {
    const before = buildSnapshot({ blocks: [block('F', {})] })
    const after = buildSnapshot({ blocks: [block('F', {}, { role: 'controller', unitIn: '', unitOut: 'A', notes: 'retuned' })] })
    expect(compareSnapshots(before, after).blockChanges)
      .toEqual(['block F (controller): role filter to controller, unit of its input V to none, unit of its output V to A, notes changed; used by no loop'])
  })

  it('a condition called constructor has a gain only where one was given', () => {
    const { conditions } = buildSnapshot()
    const before = buildSnapshot({ conditions: [{ ...conditions[0]!, code: 'constructor' }], blocks: [block('F', {})], cells: [] })
    const after = { ...before, blocks: [block('F', { constructor: lag(1) } as SnapshotBlock['definitions'])] }
    expect(compareSnapshots(before, after).blockChanges).toEqual(['block F (filter): gain added in constructor; used by no loop'])
  })
})
