import { AppError } from '#shared/errors/AppError'
import { RevisionRow } from '../../database/models/RevisionRow'

/**
 * Throws 'refused' where one of these reports has a revision that was issued: a customer holds it, so what it stands in is not taken
 * out of sight by its engineer alone.
 */
export async function assertNothingIssued(reportIds: readonly number[], what: string): Promise<void> {
  const issued = await RevisionRow.findOne({ where: { reportId: [...reportIds], state: ['issued', 'superseded', 'withdrawn'] }, attributes: ['letter'] })
  if (issued) throw new AppError('refused', `${what} has revision ${issued.letter}, which was issued: the customer keeps reading it, so it cannot be deleted.`)
}
