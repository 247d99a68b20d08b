import { describe, expect, it } from 'vitest'
import type { OperatingCondition } from '#shared/types/system'
import { readConditionTable } from '~/utils/readConditionTable'

const condition = (id: number, code: string, name: string): OperatingCondition => ({ id, code, name, version: 1, systemId: 1, coordinates: [], tags: [], notes: '', position: id })
const conditions = [condition(11, 'C1', 'Stowed'), condition(12, 'C2', 'Extended, sea state 5')]

describe('a table of values by condition, pasted from a spreadsheet', () => {
  it('tells every fault with its line: unknown conditions, names that are none, values that are no numbers', () => {
    expect(readConditionTable('', conditions)).toEqual({ problems: [expect.stringContaining('Paste a head')] })
    expect(readConditionTable('\tJ\t2k\tJ\nC1\t1\t2\t3\nC9\t4\t5\t6\nC2\tmuch\t\t7\t8\nC2\t1\t2\t3', conditions)).toEqual({
      problems: [
        'Line 1, column 3: \'2k\' cannot be the name of a parameter: a letter, then letters, digits and underscores.',
        'Line 1, column 4: J stands twice.',
        'Line 3: \'C9\' is no condition of this system; its conditions are C1, C2.',
        'Line 4: there are more values than names; \'8\' stands under none.',
        'Line 4: \'much\' for J is not a number. Write it like 12.5 or 1.2e3.',
        'Line 5: C2 stands twice.',
      ],
    })
  })

  it('gives each parameter its value in each condition, named by code or by name', () => {
    expect(readConditionTable('condition\tJ, kg m2\tk_p [V/rad]\tw\r\nextended, sea state 5\t1,5\t20\t\r\nC1\t1.2e3\t\t7\r\n', conditions)).toEqual({
      codes: ['C2', 'C1'],
      parameters: [
        { name: 'J', unit: 'kg m2', values: { 11: '1.2e3', 12: '1.5' } },
        { name: 'k_p', unit: 'V/rad', values: { 11: '', 12: '20' } },
        { name: 'w', unit: '', values: { 11: '7', 12: '' } },
      ],
    })
  })

  it('takes semicolons and commas where there are no tabs', () => {
    expect(readConditionTable(';J;k\nC1;1;2', conditions)).toMatchObject({ parameters: [{ name: 'J', values: { 11: '1' } }, { name: 'k', values: { 11: '2' } }] })
    expect(readConditionTable(',J,k\nC1,1,2', conditions)).toMatchObject({ parameters: [{ name: 'J', values: { 11: '1' } }, { name: 'k', values: { 11: '2' } }] })
  })
})
