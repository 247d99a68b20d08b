import { describe, expect, it } from 'vitest'
import type { Parameter } from '#shared/types/system'
import { parametersWithValues } from '~/utils/parametersWithValues'

const parameters: Parameter[] = [
  { id: 1, version: 4, systemId: 1, name: 'k', unit: '1/s', notes: 'gain', position: 0, values: { 10: 6, 11: 7 } },
  { id: 2, version: 1, systemId: 1, name: 'wz', unit: 'rad/s', notes: '', position: 1, values: { 10: 2 } },
]
const common = { parameters, conditionId: 10, newIn: [10, 11] }

describe('parameters with the values typed beside an expression', () => {
  it('are not saved where none was typed', () => {
    expect(parametersWithValues({ ...common, values: {} })).toBeNull()
  })

  it('are refused as a whole where one is no number', () => {
    expect(() => parametersWithValues({ ...common, values: { k: '6.5', wz: '2,5' } })).toThrow(`wz: '2,5' is not a number`)
  })

  it('lose their value where the field was emptied, in this condition only', () => {
    expect(parametersWithValues({ ...common, values: { k: ' ' } })?.[0]!.values).toEqual({ 11: 7 })
  })

  it('change in this condition only, and carry the versions they were made from', () => {
    const list = parametersWithValues({ ...common, values: { k: '6.5' } })
    expect(list).toEqual([
      { id: 1, version: 4, name: 'k', unit: '1/s', notes: 'gain', values: { 10: 6.5, 11: 7 } },
      { id: 2, version: 1, name: 'wz', unit: 'rad/s', notes: '', values: { 10: 2 } },
    ])
    expect(parameters[0]!.values[10]).toBe(6)
  })

  it('are added with their value in every condition the source is stored for', () => {
    expect(parametersWithValues({ ...common, values: { zh: '0.4', forgotten: '' } })?.slice(2)).toEqual([{ name: 'zh', unit: '', notes: '', values: { 10: 0.4, 11: 0.4 } }])
  })
})
