import { describe, expect, it } from 'vitest'
import { completionsAt, type CompletionName } from '~/utils/completionsAt'

const names: CompletionName[] = [
  { name: 'C', kind: 'block' },
  { name: 'C2', kind: 'block' },
  { name: 'servo', kind: 'block' },
  { name: 'G', kind: 'block', outputs: ['rate', 'angle'], inputs: ['torque'] },
  { name: 'k_servo', kind: 'parameter' },
]
const offered = (text: string, caret = text.length, asked = false) => completionsAt(text, caret, names, asked)?.items.map(item => item.text) ?? []

describe('names offered at the caret', () => {
  it('are none after an operator, within a number, or where nothing fits', () => {
    expect(offered('')).toEqual([])
    expect(offered('C*')).toEqual([])
    expect(offered('1e')).toEqual([])
    expect(offered('2.5', 3, true)).toEqual([])
    expect(offered('C*xyz')).toEqual([])
  })

  it('are all of them where the person asks before the first letter', () => {
    expect(offered('C*', 2, true)).toEqual(['C', 'C2', 'servo', 'G', 'k_servo'])
  })

  it('are those that begin with what is typed, then those that hold it', () => {
    expect(offered('2*se')).toEqual(['servo', 'k_servo'])
    expect(offered('2*SE')).toEqual(['servo', 'k_servo'])
  })

  it('leave a name that is whole, and the variable, as they are: none is chosen for the person', () => {
    expect(completionsAt('1/s', 3, names)).toMatchObject({ isWhole: true })
    expect(completionsAt('C', 1, names)).toMatchObject({ isWhole: true, items: [{ text: 'C' }, { text: 'C2' }] })
    expect(completionsAt('k_servo', 7, names)).toBeNull()
  })

  it('take the place of the whole word in which the caret stands', () => {
    expect(completionsAt('2*serxyz+1', 5, names)).toMatchObject({ from: 2, to: 8 })
  })

  it('are the outputs in the brackets of a block, and the inputs after the comma', () => {
    expect(offered('C*G[')).toEqual(['rate', 'angle'])
    expect(offered('C*G[an')).toEqual(['angle'])
    expect(offered('C*G[angle, ')).toEqual(['torque'])
    expect(offered('C*G[1, ')).toEqual(['torque'])
  })
})
