import { registerEndpoint } from '@nuxt/test-utils/runtime'
import { setResponseStatus } from 'h3'
import { describe, expect, it } from 'vitest'
import { ApiError } from '~/services/ApiError'
import { callApi, onSignedOut } from '~/services/apiClient'

describe('what a route refused', () => {
  it('carries code, words, field and details as the route gave them', async () => {
    registerEndpoint('/api/loops/1', { method: 'PATCH', handler: (event) => {
      setResponseStatus(event, 409)
      return { error: { code: 'conflict', message: 'Changed meanwhile.', path: 'code', details: { current: { version: 3 } } } }
    } })
    await expect(callApi('PATCH', '/api/loops/1', { body: {} })).rejects.toMatchObject({ name: 'ApiError', code: 'conflict', message: 'Changed meanwhile.', path: 'code', details: { current: { version: 3 } } })
  })

  it('says so in words where an answer has none of its own', () => {
    expect(ApiError.from({ status: 503, data: '<html>' })).toMatchObject({ code: 'unavailable' })
    expect(ApiError.from({ status: 418, data: { error: true } })).toMatchObject({ code: 'unexpected', message: expect.stringContaining('418') })
  })

  it('tells a server that was not reached', () => {
    const failure = Object.assign(new Error('fetch failed'), { request: '/api/systems', status: undefined })
    expect(ApiError.from(failure)).toMatchObject({ code: 'unavailable', message: expect.stringContaining('could not be reached') })
  })

  it('leads to the sign-in page when the session has ended, and is still thrown so that the form stays as it is', async () => {
    let told = 0
    onSignedOut(() => told++)
    registerEndpoint('/api/systems/1/board', (event) => {
      setResponseStatus(event, 401)
      return { error: { code: 'signedOut', message: 'Sign in.' } }
    })
    await expect(callApi('GET', '/api/systems/1/board')).rejects.toMatchObject({ code: 'signedOut' })
    expect(told).toBe(1)
  })
})
