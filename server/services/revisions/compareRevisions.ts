import { compareSnapshots } from '#shared/comparison/compareSnapshots'
import { AppError } from '#shared/errors/AppError'
import type { RevisionComparison } from '#shared/types/comparison'
import { revisionLabel } from '#shared/workflow/revisionLabel'
import { findRevision } from './findRevision'
import { readSnapshot } from './readSnapshot'
import type { RevisionReader } from './RevisionReader'

/** What two revisions of one report say differently, told from their snapshots; the one frozen first is the earlier, whichever is named first. */
export async function compareRevisions(revisionId: number, otherId: number, reader: RevisionReader): Promise<RevisionComparison> {
  if (revisionId === otherId) throw new AppError('invalidInput', 'Choose two different revisions to compare.', { path: 'otherId' })
  const rows = await Promise.all([findRevision(revisionId, reader), findRevision(otherId, reader)])
  const [before, after] = rows[0].id < rows[1].id ? rows : [rows[1], rows[0]]
  if (before.reportId !== after.reportId) throw new AppError('invalidInput', 'The two revisions are of different reports.', { path: 'otherId' })
  const [was, is] = await Promise.all([readSnapshot(before.id), readSnapshot(after.id)])
  return { before: { id: before.id, label: revisionLabel(before) }, after: { id: after.id, label: revisionLabel(after) }, ...compareSnapshots(was, is) }
}
