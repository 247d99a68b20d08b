import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest'
import { AppError } from '#shared/errors/AppError'
import type { Report, Revision } from '#shared/types/report'
import { closeAnalysisPool } from '#server/adapters/analysisPool/analysisPool'
import { createChromiumPrinter } from '#server/adapters/chromium/chromiumPrinter'
import type { PdfPrinter } from '#server/adapters/chromium/PdfPrinter'
import { database as connection } from '#server/database/database'
import { ArtefactRow } from '#server/database/models/ArtefactRow'
import { JobEvent } from '#server/database/models/JobEvent'
import { JobRow } from '#server/database/models/JobRow'
import type { JobRunner, JobRunnerOptions } from '#server/jobs/createJobRunner'
import { cancelRendering } from '#server/services/jobs/cancelRendering'
import { followJob } from '#server/services/jobs/followJob'
import { createReport } from '#server/services/reports/createReport'
import { freezeRevision } from '#server/services/revisions/freezeRevision'
import { renderAgain } from '#server/services/revisions/renderAgain'
import { buildPrinter } from '../../factories/buildPrinter'
import { buildRunner } from '../../factories/buildRunner'
import { contextOf } from '../../factories/contextOf'
import { openTestDatabase } from '../../factories/openTestDatabase'
import { seedTeam } from '../../factories/seedTeam'
import type { SeededTeam } from '../../factories/seedTeam'
import { waitForJob } from '../../factories/waitForJob'

let database: Awaited<ReturnType<typeof openTestDatabase>>
let team: SeededTeam
let report: Report
const started: JobRunner[] = []

const engineer = () => contextOf(team.people.engineer)
const freeze = (): Promise<Revision> => freezeRevision(report.id, { changeNote: 'x' }, engineer())
const artefacts = (revisionId: number) => ArtefactRow.count({ where: { revisionId } })
function start(printer: PdfPrinter, options: Partial<JobRunnerOptions> = {}) {
  const runner = buildRunner(printer, options)
  started.push(runner)
  runner.start()
  return runner
}
/** A printer that waits until its print is aborted, and tells when it has begun. */
function waitingPrinter() {
  let begin: () => void = () => undefined
  const begun = new Promise<void>(resolve => begin = resolve)
  const printer = buildPrinter(({ signal }) => new Promise((_, reject) => {
    begin()
    signal?.addEventListener('abort', () => reject(signal.reason as Error), { once: true })
  }))
  return { printer, begun }
}

beforeAll(async () => {
  database = await openTestDatabase()
  team = await seedTeam()
  report = await createReport(team.system.id, { title: 'Margins', documentNumber: 'D-1' }, engineer())
})
afterEach(async () => {
  await Promise.all(started.splice(0).map(runner => runner.stop()))
})
afterAll(async () => {
  await closeAnalysisPool()
  await database.close()
})

describe('the queue of jobs', () => {
  it('leaves the draft untouched when Chromium is missing, says what to install, and renders when asked again', async () => {
    const revision = await freeze()
    const first = start(createChromiumPrinter({ executablePath: null }))
    const job = await waitForJob(revision.id, 'failed')
    expect(job.error).toMatch(/Chromium was not found.*apt-get install chromium/)
    expect(await artefacts(revision.id)).toBe(0)
    expect(first.faults).toEqual([])
    await first.stop()
    expect((await renderAgain(revision.id, engineer())).state).toBe('queued')
    await expect(renderAgain(revision.id, engineer())).rejects.toMatchObject({ code: 'conflict' })
    start(buildPrinter())
    await waitForJob(revision.id, 'done')
    expect(await artefacts(revision.id)).toBe(3)
    await expect(renderAgain(revision.id, engineer())).rejects.toMatchObject({ code: 'conflict' })
  })

  it('hides the words of a fault of the program from people, and tells the log', async () => {
    const revision = await freeze()
    const runner = start(buildPrinter(() => Promise.reject(new Error('secret detail'))))
    const job = await waitForJob(revision.id, 'failed')
    expect(job.error).not.toContain('secret')
    expect(runner.faults.map(String)).toEqual(['Error: secret detail'])
  })

  it('ends a running job that is cancelled at once and stores nothing of it', async () => {
    const { printer, begun } = waitingPrinter()
    start(printer)
    const revision = await freeze()
    await begun
    const job = await cancelRendering(revision.job?.id ?? 0, team.system.id, ['engineer'], engineer())
    expect(job.state).toBe('cancelled')
    expect(await artefacts(revision.id)).toBe(0)
    await expect(cancelRendering(job.id, team.system.id, ['engineer'], engineer())).rejects.toMatchObject({ code: 'conflict' })
  })

  it('is not cancelled where the audit cannot say so: both or neither', async () => {
    const { printer, begun } = waitingPrinter()
    start(printer)
    const revision = await freeze()
    await begun
    const jobId = revision.job?.id ?? 0
    await connection().query('CREATE TRIGGER audit_is_full BEFORE INSERT ON audit_events BEGIN SELECT RAISE(ABORT, \'full\'); END')
    const refused = await cancelRendering(jobId, team.system.id, ['engineer'], engineer()).then(() => 'cancelled', String)
    await connection().query('DROP TRIGGER audit_is_full')
    expect(refused).toMatch(/^Sequelize.*Error/)
    expect((await JobRow.findByPk(jobId))?.state).toBe('running')
    expect((await cancelRendering(jobId, team.system.id, ['engineer'], engineer())).state).toBe('cancelled')
  })

  it('is not cancelled by someone who may neither freeze nor asked for it', async () => {
    const revision = await freeze()
    const checker = contextOf(team.people.checker)
    await expect(cancelRendering(revision.job?.id ?? 0, team.system.id, ['checker'], checker)).rejects.toMatchObject({ code: 'notAllowed' })
    start(buildPrinter())
    await waitForJob(revision.id, 'done')
  })

  it('gives a running job back when the server stops, and the next server does it', async () => {
    const { printer, begun } = waitingPrinter()
    const first = start(printer)
    const revision = await freeze()
    await begun
    await first.stop()
    expect(await JobRow.findByPk(revision.job?.id)).toMatchObject({ state: 'queued', attempts: 0 })
    start(buildPrinter())
    await waitForJob(revision.id, 'done')
  })

  it('takes up a job whose server died, when its lease has run out and not before', async () => {
    const revision = await freeze()
    const now = Date.now()
    await JobRow.update({ state: 'running', attempts: 1, leaseUntil: new Date(now + 60_000).toISOString() }, { where: { id: revision.job?.id } })
    const early = start(buildPrinter())
    await new Promise(resolve => setTimeout(resolve, 600))
    expect((await JobRow.findByPk(revision.job?.id))?.state).toBe('running')
    await early.stop()
    start(buildPrinter(), { clock: () => new Date(Date.now() + 61_000) })
    expect(await waitForJob(revision.id, 'done')).toMatchObject({ attempts: 2 })
  })

  it('fails a job whose server died three times over it, and goes on with the next', async () => {
    const poisoned = await freeze()
    await JobRow.update({ state: 'running', attempts: 3, leaseUntil: new Date(Date.now() - 1000).toISOString() }, { where: { id: poisoned.job?.id } })
    const next = await freeze()
    start(buildPrinter())
    expect((await waitForJob(poisoned.id, 'failed')).error).toMatch(/stopped 3 times/)
    await waitForJob(next.id, 'done')
  })

  it('tells its progress in words, loop by loop, from any event on, until it ends', async () => {
    const revision = await freeze()
    const jobId = revision.job?.id ?? 0
    start(buildPrinter())
    const reader = new AbortController()
    const steps: string[] = []
    for await (const { job } of followJob(jobId, 0, reader.signal)) steps.push(`${job.state}: ${job.step}`)
    expect(steps[0]).toBe('queued: Waiting its turn')
    expect(steps).toContain('running: Drawing SL-P Slew position (1 of 1)')
    expect(steps).toContain('running: Printing the PDF')
    expect(steps.at(-1)).toBe('done: Done')
    const sequences = (await JobEvent.findAll({ where: { jobId }, order: [['sequence', 'ASC']] })).map(({ sequence }) => sequence)
    expect(sequences).toEqual(sequences.map((_, index) => index + 1))
    const resumed: number[] = []
    for await (const { sequence } of followJob(jobId, sequences.length - 2, reader.signal)) resumed.push(sequence)
    expect(resumed).toEqual(sequences.slice(-2))
    const late: string[] = []
    for await (const { job } of followJob(jobId, null, reader.signal)) late.push(job.state)
    expect(late).toEqual(['done'])
  })

  it('tells a job that has ended by its row where no events were kept', async () => {
    const revision = await freeze()
    const jobId = revision.job?.id ?? 0
    await JobEvent.destroy({ where: { jobId } })
    await JobRow.update({ state: 'cancelled' }, { where: { id: jobId } })
    const states: string[] = []
    for await (const { job } of followJob(jobId, null, new AbortController().signal)) states.push(job.state)
    expect(states).toEqual(['cancelled'])
  })

  it('stops telling when its reader leaves', async () => {
    const revision = await freeze()
    const reader = new AbortController()
    setTimeout(() => reader.abort(), 100)
    const states: string[] = []
    for await (const { job } of followJob(revision.job?.id ?? 0, null, reader.signal)) states.push(job.state)
    expect(states).toEqual(['queued'])
    start(buildPrinter())
    await waitForJob(revision.id, 'done')
  })

  it('shows a refusal by the document itself in words', async () => {
    const revision = await freeze()
    start(buildPrinter(() => Promise.reject(new AppError('unavailable', 'Chromium failed twice while printing the PDF.'))))
    expect((await waitForJob(revision.id, 'failed')).error).toBe('Chromium failed twice while printing the PDF.')
  })
})
