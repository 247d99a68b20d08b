import { mountSuspended } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import type { SourceDifference } from '#shared/types/structure'
import SourceDifferences from '~/components/source/SourceDifferences.vue'

const difference = (fields: Partial<SourceDifference> = {}): SourceDifference => ({
  frequencyUnit: 'Hz', reference: 'design model', other: 'sweep 1', basis: 'At the 80 points of sweep 1.', reason: null,
  bands: [
    { from: 1, to: 10, gain: { difference: 0.84, frequency: 3 }, phase: { difference: -3.42, frequency: 4 }, relative: { ratio: 0.12, frequency: 5 } },
    { from: 10, to: 100, gain: { difference: -0.001, frequency: 30 }, phase: { difference: 12, frequency: 40 }, relative: { ratio: 1.3, frequency: 50 } },
  ],
  ...fields,
})
const mount = (given: SourceDifference) => mountSuspended(SourceDifferences, { props: { difference: given } })

describe('how far two sources lie apart', () => {
  it('says why they were not compared', async () => {
    const table = await mount(difference({ bands: [], basis: '', reason: 'sweep 1 cannot be analysed.' }))
    expect(table.text()).toContain('Not compared: sweep 1 cannot be analysed.')
    expect(table.find('table').exists()).toBe(false)
  })

  it('says signs as words, each with its frequency, and where the difference alone could reach -1', async () => {
    const table = await mount(difference())
    const rows = table.findAll('tbody tr').map(row => row.findAll('td, th').map(cell => cell.text().replace(/\s+/g, ' ')))
    expect(rows[0]).toEqual(['1.000 to 10.00', 'higher 0.84 dB', 'at 3.000', 'lags 3.42 deg', 'at 4.000', '0.12', 'at 5.000'])
    expect(rows[1]).toEqual(['10.00 to 100.0', 'the same', 'at 30.00', 'leads 12.0 deg', 'at 40.00', '1.3, could reach −1', 'at 50.00'])
    expect(table.find('caption').text()).toContain('At the 80 points of sweep 1.')
  })
})
