import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Report } from '#shared/types/report'
import { seedTeam, teamEmails, type SeededTeam } from '../factories/seedTeam'
import type { ApiCaller } from './ApiCaller'
import { startServer, type TestServer } from './startServer'

let server: TestServer & { seeded: SeededTeam }
let engineer: ApiCaller
beforeAll(async () => {
  server = await startServer({ seed: seedTeam })
  engineer = await server.signedIn(teamEmails.engineer)
})
afterAll(() => server.stop())

const reportsPath = () => `/api/systems/${server.seeded.system.id}/reports`
const fresh = async (title = 'Margins') => (await engineer.post<Report>(reportsPath(), { title, documentNumber: 'D-1' })).body

describe('a report', () => {
  it('is refused without a title, without a number, with a field it does not have', async () => {
    expect(await engineer.post(reportsPath(), { title: ' ', documentNumber: 'D-1' })).toMatchObject({ status: 400, body: { error: { path: 'title' } } })
    expect(await engineer.post(reportsPath(), { title: 'X' })).toMatchObject({ status: 400, body: { error: { path: 'documentNumber', message: 'Is missing.' } } })
    expect(await engineer.post(reportsPath(), { title: 'X', documentNumber: 'D-1', loopIds: [] })).toMatchObject({ status: 400 })
  })

  it('covers every loop and condition to begin with', async () => {
    const { status, body } = await engineer.post<Report>(reportsPath(), { title: 'Margins', documentNumber: 'D-1' })
    expect(status).toBe(201)
    expect(body).toMatchObject({ loopIds: [server.seeded.loop.id], conditionIds: [server.seeded.condition.id], version: 1, remarks: '', loopRemarks: {} })
  })

  it('is changed from its newest version only, to loops of its own system only', async () => {
    const { id } = await fresh()
    expect(await engineer.patch(`/api/reports/${id}`, { version: 1, remarks: '**Bold**', loopRemarks: { [server.seeded.loop.id]: 'Governs.' } })).toMatchObject({ status: 200, body: { version: 2, remarks: '**Bold**' } })
    expect(await engineer.patch(`/api/reports/${id}`, { version: 1, remarks: 'late' })).toMatchObject({ status: 409, body: { error: { details: { current: { version: 2, remarks: '**Bold**' } } } } })
    expect(await engineer.patch(`/api/reports/${id}`, { version: 2, loopIds: [4711] })).toMatchObject({ status: 400, body: { error: { path: 'loopIds[0]', message: 'There is no such loop in this system.' } } })
    expect(await engineer.patch(`/api/reports/${id}`, { version: 2, conditionIds: [server.seeded.condition.id, server.seeded.condition.id] })).toMatchObject({ status: 400, body: { error: { path: 'conditionIds' } } })
  })

  it('that is deleted is not found until it is restored', async () => {
    const { id } = await fresh()
    expect(await engineer.delete(`/api/reports/${id}`)).toMatchObject({ status: 200, body: { id } })
    expect((await engineer.get(`/api/reports/${id}`)).status).toBe(404)
    expect(await engineer.post(`/api/reports/${id}/restore`)).toMatchObject({ status: 200, body: { id } })
    expect((await engineer.get(`/api/reports/${id}`)).status).toBe(200)
  })

  it('is read with all its draft is made from', async () => {
    const { id } = await fresh()
    const { body } = await engineer.get<Record<string, unknown[]>>(`/api/reports/${id}`)
    expect(Object.keys(body).sort()).toEqual(['conditions', 'criteria', 'loops', 'report', 'revisions', 'roles', 'system'])
    expect(body.roles).toEqual(['engineer'])
  })

  it('is not found by a customer while nothing of it is issued', async () => {
    const { id } = await fresh()
    const customer = await server.signedIn(teamEmails.customer)
    expect((await customer.get(`/api/reports/${id}`)).status).toBe(404)
    expect((await customer.get<unknown[]>(reportsPath())).body).toEqual([])
  })

  it('is previewed as a page that may run and load nothing, marked a preview', async () => {
    const { id } = await fresh('<script>alert(1)</script>')
    const { status, headers, body } = await engineer.get<string>(`/api/reports/${id}/preview`)
    expect(status).toBe(200)
    expect(headers.get('content-type')).toBe('text/html; charset=utf-8')
    expect(headers.get('content-security-policy')).toMatch(/^default-src 'none';.*sandbox$/)
    expect(body).toContain('PREVIEW')
    expect(body).toContain('&lt;script&gt;alert(1)')
    expect(body).not.toContain('<script')
    expect(body).toContain('SL-P Slew position')
    expect(body).toContain('font/woff2;base64,')
  })
})
