import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Brand } from '#shared/types/brand'
import { seedTeam, teamEmails, type SeededTeam } from '../factories/seedTeam'
import type { ApiCaller } from './ApiCaller'
import { startServer, type TestServer } from './startServer'

let server: TestServer & { seeded: SeededTeam }
let administrator: ApiCaller
beforeAll(async () => {
  server = await startServer({ seed: seedTeam })
  administrator = await server.signedIn(teamEmails.administrator)
})
afterAll(() => server.stop())

const fields = { teamName: 'Loop team', accent: '#a3195b', addressLine: 'Quay 4', pageSize: 'Letter' }
const drawing = '<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 4 4"><script>alert(1)</script><circle cx="2" cy="2" r="2"/></svg>'

describe('the brand', () => {
  it('is refused with a colour that is none, a page size there is not, or from an older version', async () => {
    expect(await administrator.put('/api/brand', { ...fields, accent: 'red', version: 1 })).toMatchObject({ status: 400, body: { error: { path: 'accent', message: 'Must be a colour as #RRGGBB.' } } })
    expect(await administrator.put('/api/brand', { ...fields, pageSize: 'A3', version: 1 })).toMatchObject({ status: 400, body: { error: { path: 'pageSize' } } })
    expect(await administrator.put('/api/brand', { ...fields, version: 9 })).toMatchObject({ status: 409, body: { error: { details: { current: { version: 1 } } } } })
  })

  it('is changed by an administrator and read by all', async () => {
    expect(await administrator.put('/api/brand', { ...fields, version: 1 })).toMatchObject({ status: 200, body: { teamName: 'Loop team', accent: '#A3195B', version: 2 } })
    const engineer = await server.signedIn(teamEmails.engineer)
    expect(await engineer.get('/api/brand')).toMatchObject({ status: 200, body: { ...fields, accent: '#A3195B', hasMark: false } })
    expect((await engineer.put('/api/brand', { ...fields, version: 2 })).status).toBe(403)
  })

  it('takes a mark, makes it safe, hands it out so that it cannot run, and gives it up again', async () => {
    expect((await administrator.get('/api/brand/mark')).status).toBe(204)
    expect(await administrator.call<Brand>('PUT', '/api/brand/mark', drawing, { 'content-type': 'image/svg+xml' })).toMatchObject({ status: 200, body: { hasMark: true, version: 3 } })
    const { headers, body } = await administrator.get<string>('/api/brand/mark')
    expect(headers.get('content-type')).toBe('image/svg+xml')
    expect(headers.get('content-security-policy')).toMatch(/default-src 'none'.*sandbox/)
    expect(headers.get('content-disposition')).toMatch(/^attachment/)
    expect(body).toContain('<circle')
    expect(body).not.toContain('script')
    expect(await administrator.delete('/api/brand/mark')).toMatchObject({ status: 200, body: { hasMark: false } })
  })

  it('refuses a mark that is no image, or too large', async () => {
    expect(await administrator.call('PUT', '/api/brand/mark', 'hello', { 'content-type': 'image/png' })).toMatchObject({ status: 400, body: { error: { path: 'mark' } } })
    expect((await administrator.call('PUT', '/api/brand/mark', 'x'.repeat(1_000_001), { 'content-type': 'image/png' })).status).toBe(413)
  })
})
