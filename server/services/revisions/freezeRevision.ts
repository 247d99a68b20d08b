import { AppError } from '#shared/errors/AppError'
import type { NewRevision } from '#shared/schemas/revision'
import type { Revision } from '#shared/types/report'
import { freezeObstacles } from '#shared/workflow/freezeObstacles'
import { nextDraft } from '#shared/workflow/nextDraft'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import type { ReportRow } from '../../database/models/ReportRow'
import { RevisionRow } from '../../database/models/RevisionRow'
import { enqueueJob } from '../../jobs/enqueueJob'
import { collectSnapshot, coverageOf } from '../../reports/collectSnapshot'
import { sha256Of } from '../../reports/sha256Of'
import { writeSnapshot } from '../../reports/snapshotText'
import type { ServiceContext } from '../context'
import { findReport } from '../reports/findReport'
import { reportStamp } from '../reports/reportStamp'
import { judgeCells } from '../systems/judgeCells'
import { readSystem } from '../systems/readSystem'
import { presentRevisions } from './listRevisions'

/** Times a freeze is begun again when somebody changes the system meanwhile. */
const mostTries = 3

/** Throws 'refused' with every obstacle in words where the report cannot be frozen. */
async function assertFreezable(report: ReportRow, context: ServiceContext): Promise<void> {
  const covered = await coverageOf(report)
  const obstacles = freezeObstacles({ ...covered, disagreements: await disagreementsIn(report, covered, context) })
  if (obstacles.length > 0) throw new AppError('refused', `This report cannot be frozen yet. ${obstacles.join(' ')}`, { details: { obstacles } })
}

async function disagreementsIn(report: ReportRow, { loops, conditions }: Awaited<ReturnType<typeof coverageOf>>, context: ServiceContext) {
  const all = await readSystem(report.systemId)
  const cells = await judgeCells(all.system, loops, conditions.map(condition => condition.id), all.criteria, all.loops, context)
  return cells.flatMap(({ loopId, conditionId, disagreement }) => disagreement === null
    ? []
    : [{ loopCode: loops.find(({ id }) => id === loopId)?.code ?? '', conditionCode: conditions.find(({ id }) => id === conditionId)?.code ?? '', words: disagreement }])
}

/** The revision stored if nothing changed since the stamp was taken; null where it must be tried again. */
async function tryToFreeze(reportId: number, changeNote: string, context: ServiceContext): Promise<RevisionRow | null> {
  // The stamp first: whatever is read after it and changed in between, the report's own row too, differs from it at the end.
  const stamp = await reportStamp(await findReport(reportId))
  const report = await findReport(reportId)
  await assertFreezable(report, context)
  const revisions = await RevisionRow.findAll({ where: { reportId } })
  const draft = { ...nextDraft(revisions), changeNote }
  const snapshot = await collectSnapshot(report, draft, context)
  const text = writeSnapshot(snapshot)
  return writeTransaction(async () => {
    if (await reportStamp(report) !== stamp) return null
    const row = await RevisionRow.create({
      ...draft,
      reportId,
      state: 'draft',
      snapshot: text,
      snapshotSha256: sha256Of(text),
      frozenBy: context.actor.id,
      frozenByName: context.actor.name,
      frozenAt: snapshot.frozenAt,
    })
    await enqueueJob({ revisionId: row.id, edition: 'draft', requestedBy: context.actor.id }, context.clock())
    await recordAudit(context, 'revision frozen', { systemId: report.systemId, subjectId: row.id, payload: { reportId, ...draft, snapshotSha256: row.snapshotSha256 } })
    return row
  })
}

/**
 * Freezes a report: takes a snapshot of every input and result as the next draft of the letter after the newest issued one, and queues its
 * rendering. Throws 'refused' with the obstacles in words where a loop lacks its break point, break points of one
 * closed system disagree, or nothing is covered.
 */
export async function freezeRevision(reportId: number, { changeNote }: NewRevision, context: ServiceContext): Promise<Revision> {
  for (let attempt = 1; attempt <= mostTries; attempt++) {
    const row = await tryToFreeze(reportId, changeNote, context)
    if (row === null) continue
    const [revision] = await presentRevisions([row], { actorId: context.actor.id, seesDrafts: true })
    if (revision) return revision
  }
  throw new AppError('conflict', 'The system is being changed at this moment. Freeze again when it is at rest.')
}
