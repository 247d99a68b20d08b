import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Person } from '#shared/types/person'
import { seedTeam, teamEmails } from '../factories/seedTeam'
import type { ApiCaller } from './ApiCaller'
import { startServer, type TestServer } from './startServer'

let server: TestServer
let administrator: ApiCaller
beforeAll(async () => {
  server = await startServer({ seed: seedTeam })
  administrator = await server.signedIn(teamEmails.administrator)
})
afterAll(() => server.stop())

interface OutboxEntry { to: string, subject: string, text: string, sentAt: string | null }
const newestMail = async () => ((await administrator.get<OutboxEntry[]>('/api/outbox')).body)[0] as OutboxEntry
const tokenIn = (mail: OutboxEntry) => /\/password\?token=([\w-]+)/.exec(mail.text)?.[1] as string
const invite = (email: string, name = 'Dee') => administrator.post<Person>('/api/people', { name, email })

describe('the first administrator', () => {
  it('is made by the first visitor of an empty database, once', async () => {
    const empty = await startServer()
    try {
      const visitor = empty.stranger()
      expect((await visitor.get('/api/auth/set-up')).body).toEqual({ needsFirstAdministrator: true })
      expect(await visitor.post('/api/auth/set-up', { name: 'Ada', email: 'ada@example.org', password: 'short' })).toMatchObject({ status: 400, body: { error: { path: 'password', message: 'At least 12 characters.' } } })
      const fields = { name: 'Ada', email: 'ada@example.org', password: 'a long enough one' }
      const replies = await Promise.all([visitor.post('/api/auth/set-up', fields), visitor.post('/api/auth/set-up', { ...fields, email: 'eve@example.org' })])
      expect(replies.map(reply => reply.status).sort()).toEqual([200, 403])
      const caller = empty.stranger()
      const email = replies[0].status === 200 ? 'ada@example.org' : 'eve@example.org'
      await caller.signIn(email, fields.password)
      expect((await caller.get('/api/people')).body).toMatchObject([{ email, isAdministrator: true }])
    }
    finally {
      await empty.stop()
    }
  })
})

describe('an invitation', () => {
  it('makes an account that cannot sign in until its link has set a password, and is good once', async () => {
    expect(await invite('dee@example.org')).toMatchObject({ status: 201, body: { email: 'dee@example.org', invitationOpen: true, isAdministrator: false } })
    expect((await server.stranger().post('/api/auth/sign-in', { email: 'dee@example.org', password: '' })).status).toBe(401)
    const mail = await newestMail()
    expect(mail).toMatchObject({ to: 'Dee <dee@example.org>', sentAt: null })
    expect(mail.text).toContain(`${server.url}/password?token=`)
    const visitor = server.stranger()
    expect(await visitor.post('/api/auth/password', { token: tokenIn(mail), password: 'tooshort' })).toMatchObject({ status: 400, body: { error: { path: 'password' } } })
    expect((await visitor.post('/api/auth/password', { token: tokenIn(mail), password: 'a brand new password' })).status).toBe(200)
    await visitor.signIn('dee@example.org', 'a brand new password')
    expect(await visitor.post('/api/auth/password', { token: tokenIn(mail), password: 'a second password' })).toMatchObject({ status: 410, body: { error: { code: 'gone', path: 'token' } } })
  })

  it('sent again makes the former link worthless', async () => {
    const { body: person } = await invite('fay@example.org')
    const first = tokenIn(await newestMail())
    expect((await administrator.post(`/api/people/${person.id}/invitation`)).status).toBe(200)
    const second = tokenIn(await newestMail())
    expect((await server.stranger().post('/api/auth/password', { token: first, password: 'a brand new password' })).status).toBe(410)
    expect((await server.stranger().post('/api/auth/password', { token: second, password: 'a brand new password' })).status).toBe(200)
    expect(await administrator.post(`/api/people/${person.id}/invitation`)).toMatchObject({ status: 422, body: { error: { code: 'refused' } } })
  })

  it('is refused for an address that has an account, and for one that could be read as two', async () => {
    expect(await invite(teamEmails.engineer)).toMatchObject({ status: 409, body: { error: { path: 'email' } } })
    for (const email of ['eve@example.org\r\nBcc: x@example.org', 'a@example.org,b@example.org', '"a b"@example.org', 'nobody', 'a@example.org>']) {
      expect(await invite(email)).toMatchObject({ status: 400, body: { error: { path: 'email' } } })
    }
    expect(await invite('gus@example.org', 'Gus\r\nBcc: x@example.org')).toMatchObject({ status: 400, body: { error: { path: 'name' } } })
  })
})

describe('a forgotten password', () => {
  it('is reset by a link, which ends the sessions there were', async () => {
    const before = await server.signedIn(teamEmails.checker)
    const visitor = server.stranger()
    expect(await visitor.post('/api/auth/reset-request', { email: teamEmails.checker })).toMatchObject({ status: 200, body: {} })
    const token = tokenIn(await newestMail())
    expect((await visitor.post('/api/auth/password', { token, password: 'another good password' })).status).toBe(200)
    expect((await before.get('/api/auth/session')).status).toBe(401)
    await visitor.signIn(teamEmails.checker, 'another good password')
  })

  it('of nobody gets the same answer, and no mail', async () => {
    const before = await newestMail()
    expect(await server.stranger().post('/api/auth/reset-request', { email: 'nobody@example.org' })).toMatchObject({ status: 200, body: {} })
    expect(await newestMail()).toEqual(before)
  })
})

describe('the administrator', () => {
  const idOf = async (email: string) => ((await administrator.get<Person[]>('/api/people')).body.find(person => person.email === email) as Person).id

  it('disables an account, which ends its sessions, and enables it again', async () => {
    const approver = await server.signedIn(teamEmails.approver)
    const id = await idOf(teamEmails.approver)
    expect((await administrator.patch<Person>(`/api/people/${id}`, { disabled: true })).body.disabledAt).toMatch(/^\d{4}-.*Z$/)
    expect((await approver.get('/api/systems')).status).toBe(401)
    expect((await server.stranger().post('/api/auth/sign-in', { email: teamEmails.approver, password: 'correct horse battery' })).status).toBe(401)
    expect((await administrator.patch<Person>(`/api/people/${id}`, { disabled: false })).body.disabledAt).toBeNull()
    await server.signedIn(teamEmails.approver)
  })

  it('cannot leave nobody to administer', async () => {
    const id = await idOf(teamEmails.administrator)
    expect(await administrator.patch(`/api/people/${id}`, { isAdministrator: false })).toMatchObject({ status: 422, body: { error: { code: 'refused', path: 'isAdministrator' } } })
    expect(await administrator.patch(`/api/people/${id}`, { disabled: true })).toMatchObject({ status: 422, body: { error: { path: 'disabled' } } })
    expect((await administrator.get('/api/people')).status).toBe(200)
  })

  it('is told of a person that does not exist, and of a change of nothing', async () => {
    expect((await administrator.patch('/api/people/4711', { name: 'X' })).status).toBe(404)
    expect((await administrator.patch('/api/people/1', {})).status).toBe(400)
  })
})
