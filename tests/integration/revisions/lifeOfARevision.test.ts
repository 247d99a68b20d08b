import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest'
import type { Report, Revision } from '#shared/types/report'
import type { Role } from '#shared/types/person'
import { AuditEvent } from '#server/database/models/AuditEvent'
import { ReportRow } from '#server/database/models/ReportRow'
import { RevisionRow } from '#server/database/models/RevisionRow'
import type { Actor } from '#server/services/context'
import { updateLoop } from '#server/services/loops/updateLoop'
import { replaceMembers } from '#server/services/members/replaceMembers'
import { createReport } from '#server/services/reports/createReport'
import { listReports } from '#server/services/reports/listReports'
import { updateReport } from '#server/services/reports/updateReport'
import { compareRevisions } from '#server/services/revisions/compareRevisions'
import { freezeRevision } from '#server/services/revisions/freezeRevision'
import { issueRevision } from '#server/services/revisions/issueRevision'
import { renderAgain } from '#server/services/revisions/renderAgain'
import { readArtefact } from '#server/services/revisions/readArtefact'
import { readRevision } from '#server/services/revisions/readRevision'
import { readSnapshot, readSnapshotText } from '#server/services/revisions/readSnapshot'
import { revisionReader } from '#server/services/revisions/RevisionReader'
import { listSystems } from '#server/services/systems/listSystems'
import { updateSystem } from '#server/services/systems/updateSystem'
import { closeAnalysisPool } from '#server/adapters/analysisPool/analysisPool'
import { canonicalJson } from '#server/reports/canonicalJson'
import { sha256Of } from '#server/reports/sha256Of'
import { buildPrinter } from '../../factories/buildPrinter'
import { buildRunner } from '../../factories/buildRunner'
import { buildCondition, buildLoop, buildSource } from '../../factories/buildSystem'
import { contextOf } from '../../factories/contextOf'
import { openTestDatabase } from '../../factories/openTestDatabase'
import { seedTeam, teamEmails } from '../../factories/seedTeam'
import type { SeededTeam } from '../../factories/seedTeam'
import { waitForJob } from '../../factories/waitForJob'

let database: Awaited<ReturnType<typeof openTestDatabase>>
let team: SeededTeam
let report: Report
let duringPrint: () => Promise<void> = async () => undefined
const runner = buildRunner(buildPrinter(() => duringPrint()))

const readerOf = (actor: Actor, ...roles: Role[]) => revisionReader(actor, roles)
const engineer = () => contextOf(team.people.engineer)
const approver = () => contextOf(team.people.approver)
const obstaclesOf = async (work: Promise<unknown>): Promise<string[]> => work.then(
  () => [],
  (error: { code?: string, details?: { obstacles: string[] } }) => (error.code === 'refused' ? error.details?.obstacles ?? [] : Promise.reject(error as Error)),
)
async function frozenAndRendered(changeNote = 'A change'): Promise<Revision> {
  const revision = await freezeRevision(report.id, { changeNote }, engineer())
  await waitForJob(revision.id, 'done')
  return revision
}
async function textOf(parts: AsyncGenerator<Buffer>): Promise<string> {
  const chunks: Buffer[] = []
  for await (const part of parts) chunks.push(part)
  return Buffer.concat(chunks).toString('utf8')
}

beforeAll(async () => {
  database = await openTestDatabase()
  team = await seedTeam()
  report = await createReport(team.system.id, { title: 'Margins', documentNumber: 'D-1' }, engineer())
  runner.start()
})

afterAll(async () => {
  await runner.stop()
  await closeAnalysisPool()
  await database.close()
  expect(runner.faults).toEqual([])
})

describe('freezing a report', () => {
  it('is refused while it covers no loop or no condition', async () => {
    const empty = await createReport(team.system.id, { title: 'Empty', documentNumber: 'D-2' }, engineer())
    await updateReport(empty.id, { version: 1, loopIds: [], conditionIds: [] }, engineer())
    expect(await obstaclesOf(freezeRevision(empty.id, { changeNote: 'x' }, engineer()))).toEqual(['The report covers no loop: choose at least one.', 'The report covers no operating condition: choose at least one.'])
  })

  it('is refused, naming the loop, while one lacks its break point; other loops that nothing is said of are at nominal', async () => {
    const bare = await buildLoop(team.system.id, engineer(), { code: 'BARE', breakPoint: '', otherLoops: '' })
    const covering = await createReport(team.system.id, { title: 'Bare', documentNumber: 'D-3' }, engineer())
    const obstacles = await obstaclesOf(freezeRevision(covering.id, { changeNote: 'x' }, engineer()))
    expect(obstacles.map(words => words.slice(0, 31))).toEqual(['BARE does not say at which sign'])
    await updateLoop(bare.id, { version: 1, breakPoint: 'command' }, engineer())
    const revision = await freezeRevision(covering.id, { changeNote: 'x' }, engineer())
    const cell = (await readSnapshot(revision.id)).cells.find(({ loopCode }) => loopCode === 'BARE')
    expect(cell).toMatchObject({ source: null, judgement: { verdict: 'no data' } })
    await waitForJob(revision.id, 'done')
  })

  it('makes a numbered draft of the first letter, with a canonical snapshot and its SHA-256', async () => {
    const revision = await freezeRevision(report.id, { changeNote: 'First issue' }, engineer())
    expect(revision).toMatchObject({ label: 'A draft 1', letter: 'A', draftNumber: 1, state: 'draft', frozenBy: 'Ada Engineer', artefacts: [] })
    expect(revision.job?.state).toBe('queued')
    const text = await readSnapshotText(revision.id)
    expect(sha256Of(text)).toBe(revision.snapshotSha256)
    expect(canonicalJson(JSON.parse(text))).toBe(text)
    const job = await waitForJob(revision.id, 'done')
    expect(job.error).toBeNull()
    const { revision: rendered } = await readRevision(revision.id, readerOf(team.people.engineer, 'engineer'))
    expect(rendered.artefacts.map(({ kind, edition }) => `${edition} ${kind}`)).toEqual(['draft html', 'draft pdf', 'draft zip'])
  })

  it('freezes the newest report when somebody changes it between its first reading and the snapshot', async () => {
    const findByPk = ReportRow.findByPk.bind(ReportRow)
    const other = await createReport(team.system.id, { title: 'Old title', documentNumber: 'D-5' }, engineer())
    const spy = vi.spyOn(ReportRow, 'findByPk').mockImplementationOnce(async (id, options) => {
      const stale = await findByPk(id, options)
      await updateReport(other.id, { version: 1, title: 'New title', loopIds: [team.loop.id], conditionIds: [team.condition.id] }, engineer())
      return stale
    })
    const revision = await freezeRevision(other.id, { changeNote: 'x' }, engineer())
    spy.mockRestore()
    expect((await readSnapshot(revision.id)).report.title).toBe('New title')
    await waitForJob(revision.id, 'done')
  })

  it('keeps what was frozen when the system changes afterwards', async () => {
    const revision = await frozenAndRendered()
    const before = await readSnapshotText(revision.id)
    const { version } = team.system
    await updateSystem(team.system.id, { version, name: 'Renamed' }, engineer())
    expect(await readSnapshotText(revision.id)).toBe(before)
    await updateSystem(team.system.id, { version: version + 1, name: team.system.name }, engineer())
  })
})

describe('issuing a draft', () => {
  it('is refused to the person who froze it', async () => {
    const revision = await frozenAndRendered()
    expect(await obstaclesOf(issueRevision(revision.id, engineer()))).toEqual(['You froze this draft yourself: another approver has to issue it.'])
  })

  it('is refused while the draft is not rendered', async () => {
    await runner.stop()
    const revision = await freezeRevision(report.id, { changeNote: 'x' }, engineer())
    expect(await obstaclesOf(issueRevision(revision.id, approver()))).toEqual(['The draft is not rendered whole yet: HTML, PDF, ZIP missing.'])
    runner.start()
    await waitForJob(revision.id, 'done')
  })

  it('is refused of an older draft', async () => {
    const older = await frozenAndRendered()
    await frozenAndRendered()
    expect(await obstaclesOf(issueRevision(older.id, approver()))).toEqual(['There is a newer draft of revision A: issue that one.'])
  })

  it('is refused while a list of a model is not proven, naming the pair', async () => {
    // k/s^2: L is real over the whole axis, a tie of the contract that is told as an exception
    const tie = await buildCondition(team.system.id, engineer(), { code: 'TIE' })
    await buildSource(team.loop.id, tie.id, engineer(), { kind: 'coefficients', numerator: [1], denominator: [1, 0, 0] })
    const other = await createReport(team.system.id, { title: 'Ties', documentNumber: 'D-4' }, engineer())
    await updateReport(other.id, { version: 1, loopIds: [team.loop.id] }, engineer())
    const revision = await freezeRevision(other.id, { changeNote: 'x' }, engineer())
    await waitForJob(revision.id, 'done')
    expect(await obstaclesOf(issueRevision(revision.id, approver()))).toEqual(['Not proven: SL-P in TIE. A report is issued only when every list of crossings of a model is proven.'])
  })

  it('gives the revision its letter, the approver and the date when the issued document is stored', async () => {
    const draft = await frozenAndRendered('First issue')
    const asked = await issueRevision(draft.id, approver())
    expect(asked.state).toBe('draft')
    expect(await obstaclesOf(issueRevision(draft.id, approver()))).toEqual(['It is being issued at this moment.'])
    const job = await waitForJob(draft.id, 'done')
    const { revision } = await readRevision(draft.id, readerOf(team.people.approver, 'approver'))
    expect(revision).toMatchObject({ label: 'A', state: 'issued', issuedBy: 'Cy Approver', issuedAt: job.createdAt })
    const html = await readArtefact(draft.id, 'html', undefined, readerOf(team.people.customer, 'customer'))
    const text = await textOf(html.bytes())
    expect(text).toContain('Cy Approver')
    expect(text).not.toContain('class="stamp"')
    expect(text.length).toBeLessThanOrEqual(html.size)
    expect((await AuditEvent.findAll({ where: { event: 'revision issued' } })).map(({ subjectId }) => subjectId)).toEqual([String(draft.id)])
  })

  it('supersedes the former issue and goes on with the next letter', async () => {
    const draft = await frozenAndRendered('Second issue')
    expect(draft.label).toBe('B draft 1')
    expect((await readSnapshot(draft.id)).history.map(({ letter }) => letter)).toEqual(['A'])
    await issueRevision(draft.id, approver())
    await waitForJob(draft.id, 'done')
    const rows = await RevisionRow.findAll({ where: { reportId: report.id }, order: [['id', 'ASC']] })
    expect(rows.filter(({ state }) => state !== 'draft').map(({ letter, state }) => `${letter} ${state}`)).toEqual(['A superseded', 'B issued'])
  })

  it('fails, and leaves the draft a draft, when a newer draft is frozen while the issued document is rendered', async () => {
    const draft = await frozenAndRendered('Third issue')
    let newer: Revision | undefined
    duringPrint = async () => {
      duringPrint = async () => undefined
      newer = await freezeRevision(report.id, { changeNote: 'Newer' }, engineer())
    }
    await issueRevision(draft.id, approver())
    const job = await waitForJob(draft.id, 'failed', 'done')
    expect(job).toMatchObject({ state: 'failed', error: 'This draft could not be issued. There is a newer draft of revision C: issue that one.' })
    const { revision } = await readRevision(draft.id, readerOf(team.people.engineer, 'engineer'))
    expect(revision.state).toBe('draft')
    expect(revision.artefacts.every(({ edition }) => edition === 'draft')).toBe(true)
    await waitForJob(newer?.id ?? 0, 'done')
  })
})

describe('an approver whose role is taken away while the issued document is rendered', () => {
  const roles = (withApprover: boolean) => replaceMembers(team.system.id, [
    { email: teamEmails.engineer, roles: ['engineer'] }, { email: teamEmails.customer, roles: ['customer'] },
    ...(withApprover ? [{ email: teamEmails.approver, roles: ['approver' as const] }] : []),
  ], engineer())

  it('issues nothing; asked for again in their name it is refused until they are approver again, and bears the time of their own act', async () => {
    const draft = await frozenAndRendered('Fourth issue')
    duringPrint = async () => {
      duringPrint = async () => undefined
      await roles(false)
    }
    await issueRevision(draft.id, approver())
    const job = await waitForJob(draft.id, 'failed', 'done')
    const words = 'This draft could not be issued. Cy Approver is no approver of this system any more: another approver has to issue it.'
    expect(job).toMatchObject({ state: 'failed', error: words })
    expect((await readRevision(draft.id, readerOf(team.people.engineer, 'engineer'))).revision.state).toBe('draft')
    await expect(renderAgain(draft.id, engineer())).rejects.toMatchObject({ code: 'refused' })
    await roles(true)
    await renderAgain(draft.id, engineer())
    await waitForJob(draft.id, 'done')
    expect((await readRevision(draft.id, readerOf(team.people.engineer, 'engineer'))).revision).toMatchObject({ state: 'issued', issuedBy: 'Cy Approver', issuedAt: job.createdAt })
  })
})

describe('a customer', () => {
  it('sees issued and superseded revisions, nothing of any draft, and no report that was never issued', async () => {
    const reader = readerOf(team.people.customer, 'customer')
    const reports = await listReports(team.system.id, reader)
    expect(reports.map(({ report: { id, loopIds, remarks } }) => [id, loopIds, remarks])).toEqual([[report.id, [], '']])
    expect(reports[0]?.revisions.map(({ label, state, job, artefacts }) => [label, state, job, [...new Set(artefacts.map(({ edition }) => edition))]])).toEqual([
      ['C', 'issued', null, ['issued']], ['B', 'superseded', null, ['issued']], ['A', 'superseded', null, ['issued']],
    ])
    const [system] = await listSystems(contextOf(team.people.customer))
    expect(system).toMatchObject({ name: team.system.name, newestIssue: 'C', description: '', loopCount: null, conditionCount: null })
    const draft = await RevisionRow.findOne({ where: { reportId: report.id, state: 'draft' } })
    await expect(readRevision(draft?.id ?? 0, reader)).rejects.toMatchObject({ code: 'notFound' })
    const issued = reports[0]?.revisions[0]?.id ?? 0
    await expect(readArtefact(issued, 'pdf', 'draft', reader)).rejects.toMatchObject({ code: 'notFound' })
    await expect(compareRevisions(issued, draft?.id ?? 0, reader)).rejects.toMatchObject({ code: 'notFound' })
  })

  it('compares two issued revisions, the earlier first whichever is named first', async () => {
    const reader = readerOf(team.people.customer, 'customer')
    const [newer, older] = (await listReports(team.system.id, reader))[0]?.revisions ?? []
    for (const [one, two] of [[newer, older], [older, newer]]) {
      const comparison = await compareRevisions(one?.id ?? 0, two?.id ?? 0, reader)
      expect([comparison.before.label, comparison.after.label]).toEqual(['B', 'C'])
    }
  })
})
