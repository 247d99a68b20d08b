import { mountSuspended } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import type { ClosedLoopPole } from '#shared/types/structure'
import ClosedLoopPoleTable from '~/components/loop/ClosedLoopPoleTable.vue'

const pole = (fields: Partial<ClosedLoopPole>): ClosedLoopPole => ({ re: -1, im: 0, frequency: 1, damping: 1, timeConstant: 1, mode: null, ...fields })
const mount = (poles: ClosedLoopPole[], reason: string | null = null) => mountSuspended(ClosedLoopPoleTable, { props: { poles: { frequencyUnit: 'rad/s' as const, poles, reason } } })

describe('the table of closed-loop poles', () => {
  it('says why there is none', async () => {
    const table = await mount([], 'A measured response tells no closed-loop poles.')
    expect(table.text()).toBe('There is no list of closed-loop poles: A measured response tells no closed-loop poles.')
    expect((await mount([])).text()).toBe('The closed loop has no pole.')
  })

  it('tells a pole beyond the boundary in words, with the time in which it grows', async () => {
    const rows = (await mount([pole({ re: 2, im: 10, frequency: 10.2, damping: -0.196, timeConstant: -0.5, mode: 'bending 1 of G' }), pole({})])).findAll('tbody tr')
    expect(rows[0]!.findAll('td').map(cell => cell.text())).toEqual(['10.20', 'pair, not stable', 'minus 0.196', 'grows by e in 500 ms', 'bending 1 of G'])
    expect(rows[1]!.findAll('td').map(cell => cell.text())).toEqual(['1.000', 'real', '1', '1.00 s', 'not told'])
  })

  it('tells the pole on the boundary as not stable', async () => {
    expect((await mount([pole({ re: 0, im: 3, damping: 0, timeConstant: null })])).text()).toContain('pair, not stable')
  })

  it('can be scrolled by keyboard where it is long, and says that it scrolls', async () => {
    const table = await mount(Array.from({ length: 40 }, (_, index) => pole({ frequency: index + 1 })))
    expect(table.find('[role=group]').attributes('tabindex')).toBe('0')
    expect(table.find('caption').text()).toContain('40 rows; this list scrolls.')
  })
})
