import { mountSuspended } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import type { CriterionRow, Judgement, Verdict } from '#shared/types/criterion'
import type { BlockEffect, EffectSide } from '#shared/types/structure'
import type { Loop, OperatingCondition } from '#shared/types/system'
import EffectTable from '~/components/block/EffectTable.vue'

const row = (quantity: CriterionRow['quantity'], direction: CriterionRow['direction'], value: number | null, verdict: Verdict = 'met'): CriterionRow => ({ quantity, direction, value, limit: null, driver: null, verdict })
const side = (distance: number, rows: CriterionRow[], verdict: Verdict = 'met'): EffectSide => ({
  verdict: 'stable', summary: null, vectorMargin: { distance, frequency: 10 }, failure: null, judgement: { verdict, rows } satisfies Judgement,
})
const unstable: EffectSide = { verdict: 'unstable', summary: null, vectorMargin: null, failure: null, judgement: { verdict: 'unstable', rows: [] } }
const rowsAt = (distance: number) => [row('vectorMargin', null, distance), row('gainMargin', 'rise', 12), row('gainMargin', 'fall', 6.1), row('phaseMargin', 'lag', 60 * distance), row('delayMargin', null, 0.01)]
const loops = [{ id: 1, code: 'SL-R' }, { id: 2, code: 'LU-P' }] as Loop[]
const conditions = [{ id: 7, code: 'C1' }, { id: 8, code: 'C2' }] as OperatingCondition[]
const mount = (effects: BlockEffect[]) => mountSuspended(EffectTable, { props: { effects, loops, conditions, systemId: 3 } })

describe('what a change of a block moves', () => {
  it('says so where no loop names it, and where nothing moves', async () => {
    expect((await mount([])).text()).toContain('No loop\'s source of record names this block')
    const still = side(0.5, rowsAt(0.5))
    const table = await mount([{ loopId: 1, conditionId: 7, before: still, after: still, moved: false }])
    expect(table.text()).toBe('Nothing moves: 1 loop in a condition, every margin as it was.')
  })

  it('lists what moves with the worst outcome first, before and after, and counts the rest', async () => {
    const before = side(0.5, rowsAt(0.5))
    const table = await mount([
      { loopId: 1, conditionId: 7, before, after: before, moved: false },
      { loopId: 1, conditionId: 8, before, after: side(0.4, rowsAt(0.4)), moved: true },
      { loopId: 2, conditionId: 7, before, after: unstable, moved: true },
    ])
    const rows = table.findAll('tbody tr').map(line => line.text().replace(/\s+/g, ' '))
    expect(rows[0]).toContain('LU-P')
    expect(rows[0]).toContain('C1 · worst')
    expect(rows[0]).toMatch(/met ?becomes ?unstable/)
    expect(rows[1]).toContain('SL-R')
    expect(rows[1]).toMatch(/0\.500 becomes 0\.400/)
    // gain and delay stay and stand once
    expect(rows[1]).toContain('fall 6.1 dB')
    expect(rows[1]).not.toMatch(/6\.1 dB becomes/)
    expect(table.text()).toContain('1 loop in a condition: not moved.')
  })

  it('counts what moves by less than is shown', async () => {
    const table = await mount([{ loopId: 1, conditionId: 7, before: side(0.5, rowsAt(0.5)), after: side(0.5, rowsAt(0.5000001)), moved: true }])
    expect(table.text()).toBe('1 loop in a condition: moved by less than is shown.')
  })

  it('tells why a loop can no longer be analysed', async () => {
    const failed: EffectSide = { verdict: 'undetermined', summary: null, vectorMargin: null, failure: 'The block G is improper.', judgement: { verdict: 'no data', rows: [] } }
    const table = await mount([{ loopId: 1, conditionId: 8, before: side(0.5, rowsAt(0.5)), after: failed, moved: true }])
    expect(table.text()).toContain('cannot be analysed')
    expect(table.text()).toContain('SL-R in C2: The block G is improper.')
  })
})
