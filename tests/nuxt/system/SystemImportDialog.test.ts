import { mountSuspended, registerEndpoint } from '@nuxt/test-utils/runtime'
import { setResponseStatus } from 'h3'
import { afterEach, describe, expect, it } from 'vitest'
import type { VueWrapper } from '@vue/test-utils'
import SystemImportDialog from '~/components/system/SystemImportDialog.vue'

let answer: { status: number, body: unknown }
let mounted: VueWrapper
registerEndpoint('/api/manifests', { method: 'POST', handler: (event) => {
  setResponseStatus(event, answer.status)
  return answer.body
} })
afterEach(() => mounted.unmount())

/** Opens the dialog and chooses a file in it. */
async function choose(name: string) {
  mounted = await mountSuspended(SystemImportDialog, { props: { open: true } })
  await expect.poll(() => document.querySelector('[role=dialog] input[type=file]')).not.toBeNull()
  const input = document.querySelector('[role=dialog] input[type=file]') as HTMLInputElement
  Object.defineProperty(input, 'files', { value: [new File(['{}'], name, { type: 'application/json' })], configurable: true })
  input.dispatchEvent(new Event('change'))
}
const words = () => document.querySelector('[role=dialog]')?.textContent ?? ''

describe('the dialog that imports a system', () => {
  it('tells every fault of the file by its path', async () => {
    const faults = [{ path: 'conditions[1].code', message: 'C1 stands twice.' }, { path: 'loops[0].sources', message: 'Choose one.' }]
    answer = { status: 400, body: { error: { code: 'invalidInput', message: faults[0]?.message, path: faults[0]?.path, details: { faults } } } }
    await choose('axis.json')
    await expect.poll(words).toContain('axis.json was not imported; nothing was stored.')
    const told = [...document.querySelectorAll('[role=dialog] li')].map(line => line.textContent?.replace(/\s+/g, ' ').trim())
    expect(told).toEqual(['conditions[1].code C1 stands twice.', 'loops[0].sources Choose one.'])
  })

  it('tells a refusal that is about no place in words', async () => {
    answer = { status: 413, body: { error: { code: 'tooLarge', message: 'The request holds more than 62,914,560 bytes.' } } }
    await choose('large.json')
    await expect.poll(words).toContain('The request holds more than 62,914,560 bytes.')
  })
})
