import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Job, Report, Revision } from '#shared/types/report'
import { seedTeam, teamEmails, type SeededTeam } from '../factories/seedTeam'
import type { ApiCaller } from './ApiCaller'
import { startServer, type TestServer } from './startServer'

let server: TestServer & { seeded: SeededTeam }
let engineer: ApiCaller
let report: Report
beforeAll(async () => {
  server = await startServer({ seed: seedTeam })
  engineer = await server.signedIn(teamEmails.engineer)
  report = (await engineer.post<Report>(`/api/systems/${server.seeded.system.id}/reports`, { title: 'Margins', documentNumber: 'D-1' })).body
})
afterAll(() => server.stop())

const freeze = async () => (await engineer.post<Revision>(`/api/reports/${report.id}/revisions`, { changeNote: 'x' })).body
async function ended(jobId: number): Promise<Job> {
  for (;;) {
    const { body } = await engineer.get<Job>(`/api/jobs/${jobId}`)
    if (body.state !== 'queued' && body.state !== 'running') return body
    await new Promise(resolve => setTimeout(resolve, 100))
  }
}
async function running(jobId: number, step: RegExp): Promise<Job> {
  for (;;) {
    const { body } = await engineer.get<Job>(`/api/jobs/${jobId}`)
    if (step.test(body.step) || (body.state !== 'queued' && body.state !== 'running')) return body
    await new Promise(resolve => setTimeout(resolve, 20))
  }
}

describe('a rendering job', () => {
  it('is finished by the next server when the one that ran it was killed, with one set of artefacts', async () => {
    const revision = await freeze()
    const jobId = revision.job?.id ?? 0
    expect((await running(jobId, /Drawing|Printing/)).state).toBe('running')
    await server.killAndRestart()
    expect(await ended(jobId)).toMatchObject({ state: 'done', error: null })
    const { body } = await engineer.get<{ revision: Revision }>(`/api/revisions/${revision.id}`)
    expect(body.revision.artefacts.map(({ kind }) => kind).sort()).toEqual(['html', 'pdf', 'zip'])
  })

  it('is cancelled while it runs: nothing is stored, and it can be asked for again', async () => {
    const revision = await freeze()
    const jobId = revision.job?.id ?? 0
    await running(jobId, /Drawing|Printing/)
    expect(await engineer.post(`/api/jobs/${jobId}/cancel`)).toMatchObject({ status: 200, body: { state: 'cancelled' } })
    const { body } = await engineer.get<{ revision: Revision }>(`/api/revisions/${revision.id}`)
    expect(body.revision).toMatchObject({ state: 'draft', artefacts: [], job: { state: 'cancelled' } })
    expect(body.revision.obstacles).toContain('The draft is not rendered whole yet: HTML, PDF, ZIP missing.')
    const { status, body: job } = await engineer.post<Job>(`/api/revisions/${revision.id}/render`)
    expect(status).toBe(200)
    expect((await ended(job.id)).state).toBe('done')
  })

  it('that does not exist is not found, nor is one of a system of others', async () => {
    expect((await engineer.get('/api/jobs/4711')).status).toBe(404)
    const outsider = await server.signedIn(teamEmails.outsider)
    expect((await outsider.get('/api/jobs/1')).status).toBe(404)
    expect((await outsider.get('/api/jobs/1/events')).status).toBe(404)
  })
})

describe('a server without Chromium', () => {
  it('says so in its health and in the failed job, and leaves the draft as it was frozen', async () => {
    const bare = await startServer({ seed: seedTeam, environment: { WIDEBERTH_CHROMIUM: '/no/such/chromium' } })
    try {
      const caller = await bare.signedIn(teamEmails.engineer)
      expect((await caller.get('/api/health')).body).toMatchObject({ chromium: 'missing' })
      const { body: made } = await caller.post<Report>(`/api/systems/${bare.seeded.system.id}/reports`, { title: 'Margins', documentNumber: 'D-1' })
      const { body: revision } = await caller.post<Revision>(`/api/reports/${made.id}/revisions`, { changeNote: 'x' })
      let job = revision.job
      while (job?.state === 'queued' || job?.state === 'running') job = (await caller.get<Job>(`/api/jobs/${job.id}`)).body
      expect(job?.error).toMatch(/Chromium was not found.*apt-get install chromium/)
      expect((await caller.get<{ revision: Revision }>(`/api/revisions/${revision.id}`)).body.revision).toMatchObject({ state: 'draft', artefacts: [], snapshotSha256: revision.snapshotSha256 })
    }
    finally {
      await bare.stop()
    }
  })
})
