import { JobRow } from '../database/models/JobRow'
import type { ServiceContext } from '../services/context'
import { listConditions } from '../services/conditions/listConditions'
import { listParameters } from '../services/parameters/listParameters'
import { replaceParameters } from '../services/parameters/replaceParameters'
import { createReport } from '../services/reports/createReport'
import { updateReport } from '../services/reports/updateReport'
import { freezeRevision } from '../services/revisions/freezeRevision'
import { issueRevision } from '../services/revisions/issueRevision'
import { listLoops } from '../services/loops/listLoops'
import { antennaMount } from './antennaMount'
import { converter } from './converter'
import type { DemoSystem } from './DemoSystem'
import { gangway } from './gangway'
import { storeDemoPeople } from './storeDemoPeople'
import { storeDemoSystem } from './storeDemoSystem'

/** Days before today on which the demo's revisions were frozen and, a day later, issued; the last of each report counts from the end. */
const daysBetweenRevisions = 21

/**
 * Fills an empty database with the demo: people, the systems, their reports, and the issued revisions, rendered as any other.
 * Where rendering fails (no Chromium, say) the revision stays a frozen draft and `say` is told why.
 */
export async function makeDemo(say: (words: string) => void): Promise<void> {
  const now = new Date()
  const daysAgo = (days: number) => new Date(now.getTime() - days * 86_400_000)
  const people = await storeDemoPeople(daysAgo(90))
  const actorOf = (role: string) => {
    const actor = people.get(`${role}@tern.example`)
    if (actor === undefined) throw new Error(`The demo has no ${role}.`)
    return actor
  }
  const as = (role: string, days: number): ServiceContext => ({ actor: actorOf(role), clock: () => daysAgo(days) })
  for (const demo of [gangway, converter, antennaMount]) {
    const oldest = demo.revisions.length * daysBetweenRevisions
    const system = await storeDemoSystem(demo, as('engineer', oldest + 10))
    const reportId = await storeDemoReport(system.id, demo, as('engineer', oldest + 3))
    for (const [index, revision] of demo.revisions.entries()) {
      const days = (demo.revisions.length - index - 1) * daysBetweenRevisions + 3
      await setParameters(system.id, revision.set, as('engineer', days + 1))
      const frozen = await freezeRevision(reportId, { changeNote: revision.changeNote }, as('engineer', days))
      if (!await hasRendered(frozen.id, 'draft', say)) break
      await issueRevision(frozen.id, as('approver', days - 1))
      if (!await hasRendered(frozen.id, 'issued', say)) break
    }
  }
}

async function storeDemoReport(systemId: number, demo: DemoSystem, context: ServiceContext): Promise<number> {
  const { title, documentNumber, remarks, loopRemarks } = demo.report
  const report = await createReport(systemId, { title, documentNumber }, context)
  const loops = await listLoops(systemId)
  const remarksById = Object.fromEntries(loops.flatMap(loop => loopRemarks[loop.code] === undefined ? [] : [[loop.id, loopRemarks[loop.code] ?? '']]))
  await updateReport(report.id, { version: report.version, remarks, loopRemarks: remarksById }, context)
  return report.id
}

async function setParameters(systemId: number, set: Record<string, number[]>, context: ServiceContext): Promise<void> {
  const [parameters, conditions] = await Promise.all([listParameters(systemId), listConditions(systemId)])
  const entries = parameters.map(({ id, version, name, unit, notes, values }) => {
    const next = set[name]
    return { id, version, name, unit, notes, values: next === undefined ? values : Object.fromEntries(conditions.map((condition, index) => [condition.id, next[index] ?? Number.NaN])) }
  })
  await replaceParameters(systemId, entries, context)
}

/** Waits until the newest job of the revision's edition has ended. */
async function hasRendered(revisionId: number, edition: 'draft' | 'issued', say: (words: string) => void): Promise<boolean> {
  for (;;) {
    const job = await JobRow.findOne({ where: { revisionId, edition }, order: [['id', 'DESC']] })
    if (job?.state === 'done') return true
    if (job === null || job.state === 'failed' || job.state === 'cancelled') {
      say(`A demo revision was not rendered: ${job?.error ?? 'there is no job for it'}`)
      return false
    }
    await new Promise(resolve => setTimeout(resolve, 200))
  }
}
