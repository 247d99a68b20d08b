import { mountSuspended, registerEndpoint } from '@nuxt/test-utils/runtime'
import { flushPromises } from '@vue/test-utils'
import { setResponseStatus } from 'h3'
import { beforeEach, describe, expect, it } from 'vitest'
import SignInForm from '~/components/signIn/SignInForm.vue'
import { sameOriginPath } from '~/services/sameOriginPath'

describe('the way back after signing in', () => {
  it.each([
    ['//elsewhere.example/systems', '/systems'],
    ['/\\elsewhere.example', '/systems'],
    ['https://elsewhere.example/', '/systems'],
    ['javascript:alert(1)', '/systems'],
    ['/sign-in?redirect=/sign-in', '/systems'],
    [undefined, '/systems'],
    [['/systems/1', '/systems/2'], '/systems'],
    ['/systems/3/loops/4?condition=5#crossings', '/systems/3/loops/4?condition=5#crossings'],
  ])('%s leads to %s', (asked, led) => {
    expect(sameOriginPath(asked)).toBe(led)
  })
})

describe('the sign-in form', () => {
  let answer: { status: number, body: unknown }
  registerEndpoint('/api/auth/set-up', () => ({ needsFirstAdministrator: false }))
  registerEndpoint('/api/auth/sign-in', { method: 'POST', handler: (event) => {
    setResponseStatus(event, answer.status)
    return answer.body
  } })
  beforeEach(() => {
    answer = { status: 401, body: { error: { code: 'signedOut', message: 'E-mail or password is wrong.' } } }
  })

  it('says in words what was refused and keeps what was typed', async () => {
    const form = await mountSuspended(SignInForm)
    const [email, password] = form.findAll('input')
    await email!.setValue('m.okafor@tern.example')
    await password!.setValue('not the password')
    await form.find('form').trigger('submit')
    await flushPromises()
    await expect.poll(() => form.find('[role=alert]').exists()).toBe(true)
    expect(form.find('[role=alert]').text()).toBe('E-mail or password is wrong.')
    expect(email!.element.value).toBe('m.okafor@tern.example')
  })

  it('tells a person who is made to wait how long', async () => {
    answer = { status: 429, body: { error: { code: 'tooManyTries', message: 'Too many tries. Wait 30 s.' } } }
    const form = await mountSuspended(SignInForm)
    await form.find('form').trigger('submit')
    await expect.poll(() => form.text()).toContain('Wait 30 s')
  })

  it('names the field at fault where the answer does', async () => {
    answer = { status: 400, body: { error: { code: 'invalidInput', message: 'This is no e-mail address.', path: 'email' } } }
    const form = await mountSuspended(SignInForm)
    await form.find('form').trigger('submit')
    await expect.poll(() => form.find('input[aria-invalid]').exists()).toBe(true)
    expect(form.find('input').attributes('aria-invalid')).toBe('true')
  })
})
