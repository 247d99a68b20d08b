import { mountSuspended } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import { defaultCriteria } from '#shared/analysis/criteria/defaultCriteria'
import type { MarginsThere, ModeShiftTable } from '#shared/types/structure'
import ModeShifts from '~/components/loop/ModeShifts.vue'
import { buildAnalysis } from '../builders/buildAnalysis'

const { summary } = buildAnalysis()
const there = (distance: number, fields: Partial<MarginsThere> = {}): MarginsThere => ({ verdict: 'stable', summary, vectorMargin: { distance, frequency: 20 }, failure: null, ...fields })
const table = (fields: Partial<ModeShiftTable> = {}): ModeShiftTable => ({
  frequencyUnit: 'Hz', nominal: there(0.7), reason: null, notes: [],
  modes: [{
    block: 'G', mode: 'bending 1', frequency: 4.2, damping: 0.011,
    shifts: [{ change: 0.2, ...there(0, { verdict: 'unstable', summary: null, vectorMargin: { distance: 0.3, frequency: 20 } }) }, { change: -0.1, ...there(0.41) }, { change: 0.1, ...there(0.6) }, { change: -0.2, ...there(0, { failure: 'The matrices have no modal form.' }) }],
  }],
  ...fields,
})
const mount = (given: ModeShiftTable) => mountSuspended(ModeShifts, { props: { table: given, criteria: [...defaultCriteria] } })
const cellsOf = async (given: ModeShiftTable) => (await mount(given)).findAll('tbody td').map(cell => cell.text())

describe('the table of mode shifts', () => {
  it('says why there is none', async () => {
    expect((await mount(table({ modes: [], reason: 'No block of this loop has a flexible mode.' }))).text()).toContain('There is no table of mode shifts: No block of this loop has a flexible mode.')
  })

  it('stands from the lowest frequency to the highest with the nominal in the middle, and gives no margin where the loop is not stable', async () => {
    const shown = await mount(table())
    expect(shown.findAll('thead th').map(head => head.text())).toEqual(['Mode', 'Hz', 'Damping', '−20 %', '−10 %', 'as modelled', '+10 %', '+20 %'])
    expect(await cellsOf(table())).toEqual(['4.200', '0.0110', 'cannot be analysed', 'under0.410', '0.700', '0.600', 'unstable'])
  })

  it('shows any of the margins, in the sign of its size, against its limit', async () => {
    const shown = await mount(table())
    await shown.find('select').setValue('rise')
    expect(shown.findAll('tbody td').map(cell => cell.text()).slice(2)).toEqual(['cannot be analysed', '12.0 dB', '12.0 dB', '12.0 dB', 'unstable'])
    await shown.find('select').setValue('fall')
    expect(shown.findAll('tbody td').map(cell => cell.text())[4]).toBe('no crossing')
  })

  it('tells what was left out', async () => {
    expect((await mount(table({ notes: ['12 modes more are left out.'] }))).text()).toContain('12 modes more are left out.')
  })
})
