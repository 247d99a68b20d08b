import { AppError } from '#shared/errors/AppError'
import { RevisionRow } from '../../database/models/RevisionRow'
import { readableStates } from './listRevisions'
import type { RevisionReader } from './RevisionReader'

/** A revision this reader may see; throws 'not found', also for a draft that is not for them. */
export async function findRevision(revisionId: number, reader: RevisionReader): Promise<RevisionRow> {
  const row = await RevisionRow.findByPk(revisionId)
  if (row === null || (!reader.seesDrafts && !readableStates.some(state => state === row.state))) throw new AppError('notFound', 'There is no such revision.')
  return row
}
