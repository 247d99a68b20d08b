import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { SessionReply } from '#shared/types/person'
import { seedTeam, teamEmails } from '../factories/seedTeam'
import { testPassword } from '../factories/buildPerson'
import { startServer, type TestServer } from './startServer'

let server: TestServer
beforeAll(async () => {
  server = await startServer({ seed: seedTeam })
})
afterAll(() => server.stop())

const cookieName = 'wideberth-session'

describe('a visitor who has not signed in', () => {
  it('is told so by the session route, and by every guarded one', async () => {
    const visitor = server.stranger()
    expect(await visitor.get('/api/auth/session')).toMatchObject({ status: 401, body: { error: { code: 'signedOut' } } })
    expect(await visitor.get('/api/systems')).toMatchObject({ status: 401, body: { error: { code: 'signedOut' } } })
  })

  it('cannot make an administrator once there is an account', async () => {
    const visitor = server.stranger()
    expect((await visitor.get('/api/auth/set-up')).body).toEqual({ needsFirstAdministrator: false })
    expect(await visitor.post('/api/auth/set-up', { name: 'Eve', email: 'eve@example.org', password: 'a long enough one' }))
      .toMatchObject({ status: 403, body: { error: { code: 'notAllowed' } } })
  })

  it('gets the same answer for a wrong password and for an account that does not exist', async () => {
    const wrong = await server.stranger().post('/api/auth/sign-in', { email: teamEmails.checker, password: 'not the password' })
    const unknown = await server.stranger().post('/api/auth/sign-in', { email: 'nobody@example.org', password: 'not the password' })
    expect(wrong.status).toBe(401)
    expect({ status: unknown.status, body: unknown.body }).toEqual({ status: wrong.status, body: wrong.body })
  })

  it('is told what is wrong with a request that is not as it should be', async () => {
    const visitor = server.stranger()
    expect(await visitor.post('/api/auth/sign-in', { email: 'a@example.org' })).toMatchObject({ status: 400, body: { error: { code: 'invalidInput', path: 'password', message: 'Is missing.' } } })
    expect(await visitor.post('/api/auth/sign-in', '{"email":')).toMatchObject({ status: 400, body: { error: { message: 'The request is not JSON.' } } })
    expect(await visitor.post('/api/auth/sign-in', { email: 'a@example.org', password: 'x', isAdministrator: true }))
      .toMatchObject({ status: 400, body: { error: { message: 'There is no field \'isAdministrator\' here.' } } })
  })

  it('must wait after five failures, for longer each time, and may then try again', async () => {
    const visitor = server.stranger()
    const attempt = () => visitor.post<{ error: { details: { waitSeconds: number }, message: string } }>('/api/auth/sign-in', { email: 'guessed@example.org', password: 'a guess' })
    for (let count = 0; count < 5; count++) expect((await attempt()).status).toBe(401)
    const refused = await attempt()
    expect(refused.status).toBe(429)
    expect(refused.headers.get('retry-after')).toBe('1')
    expect(refused.body.error.message).toBe('Too many tries. Wait 1 second and try again.')
    await new Promise(resolve => setTimeout(resolve, 1100))
    expect((await attempt()).status).toBe(401)
    expect((await attempt()).body.error.details.waitSeconds).toBe(2)
    // others are not held up by it
    await server.signedIn(teamEmails.approver)
  })
})

describe('signing in', () => {
  it('puts the secret into a cookie that scripts cannot read, and nowhere else', async () => {
    const caller = server.stranger()
    const reply = await caller.post('/api/auth/sign-in', { email: ' Engineer@Example.org ', password: testPassword })
    expect(reply).toMatchObject({ status: 200, body: { token: 'cookie-session' } })
    const line = reply.headers.getSetCookie().find(cookie => cookie.startsWith(cookieName))
    expect(line).toMatch(/^wideberth-session=[\w-]{43}; Max-Age=43200; Path=\/; HttpOnly; SameSite=Lax$/)
    const secret = caller.cookie(cookieName) as string
    const page = await caller.get<string>('/systems')
    expect(page.status).toBe(200)
    expect(page.body).not.toContain(secret)
    expect(server.log()).not.toContain(secret)
  })

  it('tells who one is, with the roles in each system', async () => {
    const caller = await server.signedIn(teamEmails.engineer)
    const { body } = await caller.get<SessionReply>('/api/auth/session')
    expect(body).toMatchObject({ person: { email: teamEmails.engineer, isAdministrator: false, invitationOpen: false }, memberships: [{ role: 'engineer' }] })
    expect(JSON.stringify(body)).not.toMatch(/hash|argon/i)
  })

  it('gives a new secret each time and ends the session it replaces', async () => {
    const caller = await server.signedIn(teamEmails.engineer)
    const first = caller.cookie(cookieName) as string
    await caller.signIn(teamEmails.engineer)
    expect(caller.cookie(cookieName)).not.toBe(first)
    const thief = server.stranger()
    thief.setCookie(cookieName, first)
    expect((await thief.get('/api/auth/session')).status).toBe(401)
  })

  it('ends for good on the server when one signs out', async () => {
    const caller = await server.signedIn(teamEmails.engineer)
    const secret = caller.cookie(cookieName) as string
    expect(await caller.post('/api/auth/sign-out')).toMatchObject({ status: 200, body: {} })
    expect(caller.cookie(cookieName)).toBeUndefined()
    caller.setCookie(cookieName, secret)
    expect((await caller.get('/api/systems')).status).toBe(401)
  })
})

describe('the cookie of a server reached by https', () => {
  it('is bound to its host and to https', async () => {
    const secure = await startServer({ seed: seedTeam, environment: { WIDEBERTH_URL: 'https://margins.example.org' } })
    try {
      const reply = await secure.stranger().post('/api/auth/sign-in', { email: teamEmails.engineer, password: testPassword })
      expect(reply.headers.getSetCookie().find(cookie => cookie.includes('wideberth-session'))).toMatch(/^__Host-wideberth-session=[\w-]{43}; Max-Age=43200; Path=\/; HttpOnly; Secure; SameSite=Lax$/)
    }
    finally {
      await secure.stop()
    }
  })
})

describe('a change asked for by a page of another site', () => {
  it.each([
    ['says that it comes from elsewhere', { 'sec-fetch-site': 'cross-site' }],
    ['comes from a sister domain', { 'sec-fetch-site': 'same-site' }],
    ['names another origin', { origin: 'https://elsewhere.example' }],
    ['hides its origin', { origin: 'null' }],
  ])('is refused when it %s', async (_, headers) => {
    const caller = await server.signedIn(teamEmails.engineer)
    expect(await caller.post('/api/systems', { name: 'Forged', frequencyUnit: 'Hz' }, headers)).toMatchObject({ status: 403, body: { error: { code: 'notAllowed' } } })
    expect(JSON.stringify((await caller.get('/api/systems')).body)).not.toContain('Forged')
  })
})

describe('every answer', () => {
  it('allows no other site anything, loads nothing from elsewhere and runs no script but its own', async () => {
    const page = await server.stranger().get<string>('/sign-in')
    const policy = page.headers.get('content-security-policy') ?? ''
    expect(page.headers.get('access-control-allow-origin')).toBeNull()
    expect(page.headers.get('cache-control')).toBe('no-store')
    expect(page.headers.get('referrer-policy')).toBe('no-referrer')
    expect(policy).toMatch(/script-src 'self' 'strict-dynamic' 'nonce-[\w+/=]{16,}'/)
    expect(policy).not.toMatch(/https?:|\*|unsafe-eval/)
    expect(policy.match(/script-src [^;]*/)?.[0]).not.toContain('unsafe-inline')
    const nonce = /'nonce-([\w+/=]+)'/.exec(policy)?.[1]
    const scripts = page.body.match(/<script\b[^>]*>/g) ?? []
    expect(scripts.length).toBeGreaterThan(0)
    for (const script of scripts.filter(tag => !tag.includes('application/json'))) expect(script).toContain(`nonce="${nonce}"`)
    for (const [, address] of page.body.matchAll(/(?:src|href)="(https?:[^"]*)"/g)) expect(address).toMatch(new RegExp(`^${server.url}`))
  })

  it('of the API is kept by no cache and read as nothing but what it says', async () => {
    const { headers } = await server.stranger().get('/api/health')
    expect(headers.get('cache-control')).toBe('no-store')
    expect(headers.get('x-content-type-options')).toBe('nosniff')
    expect(headers.get('access-control-allow-origin')).toBeNull()
  })

  it('to an address that is none is not found, in the words of the API', async () => {
    expect(await server.stranger().get('/api/nothing/here')).toMatchObject({ status: 404, body: { error: { code: 'notFound' } } })
  })
})
