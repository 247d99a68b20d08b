import { AppError } from '#shared/errors/AppError'
import type { Edition } from '#shared/types/report'
import { JobRow } from '../database/models/JobRow'
import { afterCommit } from './afterCommit'
import { recordJob } from './recordJob'
import { jobSignals } from './jobSignals'

/**
 * Puts the rendering of a revision into the queue, in the running write transaction. Throws 'conflict' while one of the same edition is
 * queued or running. `requestedBy` is the person whose act it is: of an issued edition, the approver.
 */
export async function enqueueJob(request: { revisionId: number, edition: Edition, requestedBy: number }, now: Date): Promise<JobRow> {
  const open = await JobRow.count({ where: { revisionId: request.revisionId, edition: request.edition, state: ['queued', 'running'] } })
  if (open > 0) throw new AppError('conflict', 'This document is being rendered already.')
  const job = await JobRow.create({ ...request, kind: 'renderRevision', state: 'queued', step: 'Waiting its turn', done: 0, total: 0, attempts: 0, createdAt: now.toISOString() })
  await recordJob(job, {}, now)
  afterCommit(() => jobSignals.emit('queued'))
  return job
}
