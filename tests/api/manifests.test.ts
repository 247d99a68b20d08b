import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { System } from '#shared/types/system'
import { manifestExample } from '../factories/manifestExample'
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

const json = { 'content-type': 'application/json' }

describe('the manifest of a system', () => {
  it('is saved as a file named after the system, and makes the same system again', async () => {
    const { status, headers, text, body } = await engineer.get<{ system: { name: string } }>(`/api/systems/${server.seeded.system.id}/manifest`)
    expect({ status, name: body.system.name }).toEqual({ status: 200, name: 'Gangway' })
    expect(headers.get('content-disposition')).toContain('attachment; filename="Gangway.json"')
    const imported = await engineer.post<System>('/api/manifests', text, json)
    expect(imported).toMatchObject({ status: 201, body: { name: 'Gangway', version: 1 } })
    expect((await engineer.get(`/api/systems/${imported.body.id}/manifest`)).text).toBe(text)
  })

  it('is refused with every fault at its path, and then there is no such system', async () => {
    const text = (await manifestExample()).replace('"k*T*P"', '"k*T*(P"').replace('"Bench axis"', '"Never stored"')
    expect(await engineer.post('/api/manifests', text, json)).toMatchObject({
      status: 400, body: { error: { code: 'invalidInput', path: 'loops[0].sources[0].definition.expression', details: { faults: [{ path: 'loops[0].sources[0].definition.expression' }] } } },
    })
    expect((await engineer.get<{ name: string }[]>('/api/systems')).body.map(({ name }) => name)).not.toContain('Never stored')
  })

  it('is refused where it is no JSON, does not say that it is, or is too large', async () => {
    expect(await engineer.post('/api/manifests', '{"format":', json)).toMatchObject({ status: 400, body: { error: { message: expect.stringContaining('line 1, column 11') as string } } })
    expect(await engineer.post('/api/manifests', '{}', { 'content-type': 'text/plain' })).toMatchObject({ status: 400 })
    expect(await engineer.post('/api/manifests', Buffer.from('{"format": "\xB0"}', 'latin1'), json)).toMatchObject({ status: 400, body: { error: { message: expect.stringContaining('UTF-8') as string } } })
    expect(await engineer.post('/api/manifests', ' '.repeat(60 * 1024 * 1024 + 1), json)).toMatchObject({ status: 413 })
  })
})
