import { execFileSync } from 'node:child_process'
import { createHash } from 'node:crypto'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { RevisionComparison } from '#shared/types/comparison'
import type { Job, Report, Revision } from '#shared/types/report'
import { seedTeam, teamEmails, type SeededTeam } from '../factories/seedTeam'
import type { ApiCaller } from './ApiCaller'
import { startServer, type TestServer } from './startServer'

let server: TestServer & { seeded: SeededTeam }
let engineer: ApiCaller
let approver: ApiCaller
let customer: ApiCaller
let report: Report
const sessionOf = (caller: ApiCaller) => `wideberth-session=${caller.cookie('wideberth-session')}`
const bytesOf = async (caller: ApiCaller, path: string, headers: Record<string, string> = {}) => {
  const reply = await fetch(server.url + path, { headers: { cookie: sessionOf(caller), ...headers } })
  return { status: reply.status, headers: reply.headers, bytes: Buffer.from(await reply.arrayBuffer()) }
}
/** Reads the job's events as a browser does, to the end of the stream. */
async function followed(jobId: number, headers: Record<string, string> = {}): Promise<{ id: number, job: Job }[]> {
  const { headers: replied, bytes } = await bytesOf(engineer, `/api/jobs/${jobId}/events`, headers)
  expect(replied.get('content-type')).toBe('text/event-stream')
  return [...bytes.toString('utf8').matchAll(/id: (\d+)\ndata: (.+)\n\n/g)].map(([, id, data]) => ({ id: Number(id), job: JSON.parse(data ?? '') as Job }))
}
async function freeze(changeNote: string): Promise<Revision> {
  const { status, body } = await engineer.post<Revision>(`/api/reports/${report.id}/revisions`, { changeNote })
  expect(status).toBe(201)
  const events = await followed(body.job?.id ?? 0)
  expect(events.at(-1)?.job).toMatchObject({ state: 'done', error: null })
  return body
}
async function issue(id: number): Promise<void> {
  expect(await approver.post(`/api/revisions/${id}/issue`, {})).toMatchObject({ status: 200, body: { state: 'draft' } })
  const { body } = await approver.get<{ revision: Revision }>(`/api/revisions/${id}`)
  expect((await followed(body.revision.job?.id ?? 0)).at(-1)?.job).toMatchObject({ state: 'done', edition: 'issued' })
}

beforeAll(async () => {
  server = await startServer({ seed: seedTeam })
  engineer = await server.signedIn(teamEmails.engineer)
  approver = await server.signedIn(teamEmails.approver)
  customer = await server.signedIn(teamEmails.customer)
  report = (await engineer.post<Report>(`/api/systems/${server.seeded.system.id}/reports`, { title: 'Margins', documentNumber: 'D-1' })).body
})
afterAll(() => server.stop())

describe('freezing over HTTP', () => {
  it('is refused without a note of the change, and to anyone but an engineer', async () => {
    expect(await engineer.post(`/api/reports/${report.id}/revisions`, { changeNote: ' ' })).toMatchObject({ status: 400, body: { error: { path: 'changeNote' } } })
    expect((await approver.post(`/api/reports/${report.id}/revisions`, { changeNote: 'x' })).status).toBe(403)
  })

  it('is refused with every obstacle in words while nothing is covered', async () => {
    const empty = (await engineer.post<Report>(`/api/systems/${server.seeded.system.id}/reports`, { title: 'Empty', documentNumber: 'D-2' })).body
    await engineer.patch(`/api/reports/${empty.id}`, { version: 1, loopIds: [] })
    expect(await engineer.post(`/api/reports/${empty.id}/revisions`, { changeNote: 'x' })).toMatchObject({
      status: 422, body: { error: { code: 'refused', details: { obstacles: ['The report covers no loop: choose at least one.'] } } },
    })
  })

  it('renders with the real Chromium: progress in words, then HTML, PDF and ZIP that pass their own sums', async () => {
    const frozen = await freeze('First issue')
    const jobId = frozen.job?.id ?? 0
    const events = await followed(jobId, { 'last-event-id': '1' })
    expect(events[0]?.id).toBe(2)
    expect((await engineer.get<Job>(`/api/jobs/${jobId}`)).body.state).toBe('done')
    expect((await engineer.post(`/api/jobs/${jobId}/cancel`)).status).toBe(409)

    const { body: { revision } } = await engineer.get<{ revision: Revision }>(`/api/revisions/${frozen.id}`)
    expect(revision.artefacts).toHaveLength(3)
    const folder = mkdtempSync(join(tmpdir(), 'wideberth-zip-'))
    for (const { kind, size, sha256, fileName } of revision.artefacts) {
      const { status, headers, bytes } = await bytesOf(engineer, `/api/revisions/${frozen.id}/artefacts/${kind}`)
      expect([status, bytes.length, createHash('sha256').update(bytes).digest('hex'), headers.get('etag')]).toEqual([200, size, sha256, `"${sha256}"`])
      expect(headers.get('content-disposition')).toContain(`attachment; filename="${fileName}"`)
      writeFileSync(join(folder, fileName), bytes)
    }
    execFileSync('unzip', ['-q', 'D-1-A-draft-1.zip', '-d', 'package'], { cwd: folder })
    execFileSync('sha256sum', ['-c', '--strict', 'SHA256SUMS'], { cwd: join(folder, 'package') })
    expect(execFileSync('pdfinfo', ['D-1-A-draft-1.pdf'], { cwd: folder, encoding: 'utf8' })).toMatch(/Tagged:\s+yes/)
    rmSync(folder, { recursive: true })
  })
})

describe('an artefact over HTTP', () => {
  it('is shown in place with a policy that lets it run and load nothing', async () => {
    const { headers } = await bytesOf(engineer, '/api/revisions/1/artefacts/html?disposition=inline')
    expect(headers.get('content-disposition')).toMatch(/^inline;/)
    expect(headers.get('content-security-policy')).toMatch(/default-src 'none'.*frame-ancestors 'self'; sandbox$/)
    expect(headers.get('x-content-type-options')).toBe('nosniff')
  })

  it('is not sent again to who has it', async () => {
    const first = await bytesOf(engineer, '/api/revisions/1/artefacts/pdf')
    const again = await bytesOf(engineer, '/api/revisions/1/artefacts/pdf', { 'if-none-match': first.headers.get('etag') ?? '' })
    expect([again.status, again.bytes.length]).toEqual([304, 0])
  })

  it('of an unknown kind or edition is not found or refused', async () => {
    expect((await engineer.get('/api/revisions/1/artefacts/exe')).status).toBe(404)
    expect((await engineer.get('/api/revisions/1/artefacts/pdf?edition=issued')).status).toBe(404)
    expect(await engineer.get('/api/revisions/1/artefacts/pdf?edition=final')).toMatchObject({ status: 400, body: { error: { path: 'edition' } } })
  })
})

describe('issuing over HTTP', () => {
  it('is not for the engineer, nor for a customer', async () => {
    expect((await engineer.post('/api/revisions/1/issue', {})).status).toBe(403)
    expect((await customer.post('/api/revisions/1/issue', {})).status).toBe(403)
  })

  it('hides a draft from a customer, shows what is issued, and lets both letters be compared', async () => {
    for (const path of ['', '/artefacts/pdf', '/comparison/1']) expect((await customer.get(`/api/revisions/1${path}`)).status).toBe(path === '/comparison/1' ? 400 : 404)
    await issue(1)
    expect((await engineer.get<{ revision: Revision }>('/api/revisions/1')).body.revision).toMatchObject({ label: 'A', state: 'issued', issuedBy: 'Cy Approver' })
    expect((await bytesOf(customer, '/api/revisions/1/artefacts/pdf')).status).toBe(200)
    expect((await bytesOf(customer, '/api/revisions/1/artefacts/pdf?edition=draft')).status).toBe(404)

    await engineer.patch(`/api/loops/${server.seeded.loop.id}`, { version: 1, name: 'Slew position 2' })
    const { body: sources } = await engineer.post<unknown[]>(`/api/loops/${server.seeded.loop.id}/sources`, {
      conditionIds: [server.seeded.condition.id], name: 'twice the gain', definition: { kind: 'coefficients', numerator: [1.5], denominator: [1, 2, 1, 0] }, ofRecord: true, setAsideReason: '',
    })
    expect(sources).toHaveLength(1)
    const second = await freeze('Gain raised')
    expect(second.label).toBe('B draft 1')
    await issue(second.id)
    const { body } = await customer.get<RevisionComparison>(`/api/revisions/${second.id}/comparison/1`)
    expect([body.before.label, body.after.label]).toEqual(['A', 'B'])
    // 20 log10 1.5 = 3.522 dB: closed form
    expect(body.cells[0]?.differences.gainIncrease).toBeCloseTo(-20 * Math.log10(1.5), 6)
    expect(body.cells[0]).toMatchObject({ changed: true, after: { sourceName: 'twice the gain', verdict: 'not met' } })
    const { body: reports } = await customer.get<{ revisions: Revision[] }[]>(`/api/systems/${server.seeded.system.id}/reports`)
    expect(reports[0]?.revisions.map(({ label, state }) => `${label} ${state}`)).toEqual(['B issued', 'A superseded'])
  })

  it('is refused of what is issued already, with the word', async () => {
    expect(await approver.post('/api/revisions/1/issue', {})).toMatchObject({ status: 422, body: { error: { details: { obstacles: ['This revision is superseded already.'] } } } })
    expect((await engineer.post('/api/revisions/1/render')).status).toBe(409)
  })
})
