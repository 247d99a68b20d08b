import { AppError } from '#shared/errors/AppError'
import type { ReportSnapshot } from '#shared/types/snapshot'
import { RevisionRow } from '../../database/models/RevisionRow'
import { parseSnapshot } from '../../reports/snapshotText'

/** The frozen snapshot of a revision as it is stored: the text whose SHA-256 the revision carries. */
export async function readSnapshotText(revisionId: number): Promise<string> {
  const row = await RevisionRow.unscoped().findByPk(revisionId, { attributes: ['snapshot'] })
  if (row === null) throw new AppError('notFound', 'There is no such revision.')
  return row.snapshot
}

export const readSnapshot = async (revisionId: number): Promise<ReportSnapshot> => parseSnapshot(await readSnapshotText(revisionId))
