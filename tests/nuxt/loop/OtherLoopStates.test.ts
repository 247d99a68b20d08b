import { mountSuspended } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import OtherLoopStates from '~/components/loop/OtherLoopStates.vue'

const others = [{ id: 2, code: 'LU-R', name: 'Luff rate' }, { id: 3, code: 'SL-R', name: 'Slew rate' }]
const mount = (modelValue: { loopId: number, state: 'closed' | 'open' | 'held', gain: string }[], errorAt: (path: string) => string | undefined = () => undefined) =>
  mountSuspended(OtherLoopStates, { props: { others, errorAt, modelValue } })

describe('the states of the other loops', () => {
  it('are at nominal unless something else is said', async () => {
    const table = await mount([])
    expect(table.findAll('select').map(select => select.element.value)).toEqual(['at nominal', 'at nominal'])
    expect(table.find('input').exists()).toBe(false)
  })

  it('list a loop once, and no longer when it goes back to nominal', async () => {
    const table = await mount([{ loopId: 2, state: 'open', gain: '' }])
    await table.findAll('select')[0]!.setValue('closed')
    expect(table.emitted('update:modelValue')!.at(-1)).toEqual([[{ loopId: 2, state: 'closed', gain: '' }]])
    await table.findAll('select')[0]!.setValue('at nominal')
    expect(table.emitted('update:modelValue')!.at(-1)).toEqual([[]])
  })

  it('ask for the gain of a held loop, and tell its fault there', async () => {
    const table = await mount([{ loopId: 9, state: 'open', gain: '' }, { loopId: 3, state: 'held', gain: 'x' }], path => path === 'loopStates[1].gain' ? '\'x\' is not a number.' : undefined)
    const field = table.find('input')
    expect(field.attributes('aria-label')).toBe('Gain SL-R is held at')
    expect(field.attributes('aria-invalid')).toBe('true')
    expect(table.text()).toContain('\'x\' is not a number.')
    await field.setValue('0.5')
    // the state of a loop that is not shown, since it was deleted, stays
    expect(table.emitted('update:modelValue')!.at(-1)).toEqual([[{ loopId: 9, state: 'open', gain: '' }, { loopId: 3, state: 'held', gain: '0.5' }]])
  })
})
