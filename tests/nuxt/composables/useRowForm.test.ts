import { mountSuspended } from '@nuxt/test-utils/runtime'
import { flushPromises } from '@vue/test-utils'
import { beforeEach, describe, expect, it } from 'vitest'
import { defineComponent, h } from 'vue'
import { useRowForm } from '~/composables/useRowForm'
import { ApiError } from '~/services/ApiError'

interface Row {
  id: number
  version: number
  name: string
}
const row: Row = { id: 4, version: 2, name: 'as stored' }

async function mountForm(change: (fields: { name: string, version: number }) => Promise<unknown>) {
  let form!: ReturnType<typeof useRowForm<{ name: string }, Row>>
  const wrapper = await mountSuspended(defineComponent({
    setup() {
      form = useRowForm<{ name: string }, Row>({
        draftName: () => 'row:4', row: () => row, fieldsOf: found => ({ name: found?.name ?? '' }), create: () => Promise.resolve(), change,
      })
      return () => h('p', form.fields.value.name)
    },
  }))
  return { form, wrapper }
}

describe('the form of a row', () => {
  beforeEach(() => sessionStorage.clear())

  it('overwrites nothing that somebody else changed: it shows theirs and saves mine over it only when told to', async () => {
    const sent: number[] = []
    const { form } = await mountForm(async ({ version }) => {
      sent.push(version)
      if (version === 2) throw new ApiError('conflict', 'Changed meanwhile.', undefined, { current: { ...row, version: 3, name: 'theirs' } })
    })
    form.fields.value.name = 'mine'
    expect(await form.save()).toBe(false)
    expect(form.conflict.value).toEqual({ version: 3, fields: { name: 'theirs' } })
    expect(form.fields.value.name).toBe('mine')
    expect(await form.keepMine()).toBe(true)
    expect(sent).toEqual([2, 3])
  })

  it('takes theirs when told to, and then saves from their version on', async () => {
    const sent: unknown[] = []
    const { form } = await mountForm(async (fields) => {
      sent.push(fields)
      if (fields.version === 2) throw new ApiError('conflict', 'Changed meanwhile.', undefined, { current: { ...row, version: 3, name: 'theirs' } })
    })
    await form.save()
    form.takeTheirs()
    expect(form.conflict.value).toBeNull()
    await form.save()
    expect(sent.at(-1)).toEqual({ name: 'theirs', version: 3 })
  })

  it('keeps what was typed across a reload until it is saved', async () => {
    const first = await mountForm(() => Promise.reject(new ApiError('signedOut', 'Your session has ended.')))
    first.form.fields.value.name = 'typed'
    await flushPromises()
    await first.form.save()
    first.wrapper.unmount()
    const second = await mountForm(() => Promise.resolve())
    await flushPromises()
    expect(second.form.fields.value.name).toBe('typed')
    expect(second.form.restored.value).toBe(true)
    await second.form.save()
    second.wrapper.unmount()
    const third = await mountForm(() => Promise.resolve())
    await flushPromises()
    expect(third.form.fields.value.name).toBe('as stored')
    expect(third.form.restored.value).toBe(false)
  })
})
