import { createHash } from 'node:crypto'
import type { Actor } from '#server/services/context'
import { ArtefactBlob } from '#server/database/models/ArtefactBlob'
import { ArtefactRow } from '#server/database/models/ArtefactRow'
import { JobEvent } from '#server/database/models/JobEvent'
import { JobRow } from '#server/database/models/JobRow'
import { ReportRow } from '#server/database/models/ReportRow'
import { RevisionRow } from '#server/database/models/RevisionRow'
import { canonicalJson } from '#server/reports/canonicalJson'
import type { ReportSnapshot } from '#shared/types/snapshot'

const time = '2026-12-01T09:00:00.000Z'

export interface SeededReport {
  reportId: number
  revisionId: number
  jobId: number
}

/** A report of a system with an issued revision A, its artefacts (of a few bytes) and the job that rendered it. */
export async function seedReport(systemId: number, loopIds: number[], conditionIds: number[], snapshot: ReportSnapshot, engineer: Actor, approver: Actor): Promise<SeededReport> {
  const report = await ReportRow.create({ systemId, title: 'Margins', documentNumber: 'D-1', loopIds, conditionIds, remarks: '', loopRemarks: {}, version: 1, createdAt: time })
  const text = canonicalJson(snapshot)
  const revision = await RevisionRow.create({
    reportId: report.id,
    letter: 'A',
    draftNumber: 1,
    state: 'draft',
    changeNote: 'first issue',
    snapshot: text,
    snapshotSha256: createHash('sha256').update(text).digest('hex'),
    frozenBy: engineer.id,
    frozenByName: engineer.name,
    frozenAt: time,
  })
  for (const edition of ['draft', 'issued'] as const) {
    for (const [kind, mediaType] of [['html', 'text/html'], ['pdf', 'application/pdf'], ['zip', 'application/zip']] as const) {
      const bytes = Buffer.from(`${edition} ${kind}`)
      const sha256 = createHash('sha256').update(bytes).digest('hex')
      await ArtefactBlob.create({ sha256, bytes })
      await ArtefactRow.create({ revisionId: revision.id, edition, kind, fileName: `margins.${kind}`, mediaType, size: bytes.length, sha256 })
    }
  }
  await revision.update({ state: 'issued', issuedBy: approver.id, issuedByName: approver.name, issuedAt: time })
  const job = await JobRow.create({ kind: 'renderRevision', revisionId: revision.id, edition: 'draft', state: 'done', step: 'Done', done: 1, total: 1, attempts: 1, requestedBy: approver.id, createdAt: time, finishedAt: time })
  const { id, kind, revisionId, edition, state, step, done, total } = job
  await JobEvent.create({ jobId: id, sequence: 1, payload: { id, kind, revisionId, edition, state, step, done, total, error: null }, createdAt: time })
  return { reportId: report.id, revisionId: revision.id, jobId: job.id }
}
