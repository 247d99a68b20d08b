import { AppError } from '#shared/errors/AppError'
import { SourceRow } from '../../database/models/SourceRow'

/** A source by id; throws 'not found'. */
export async function findSource(sourceId: number): Promise<SourceRow> {
  const source = await SourceRow.findByPk(sourceId)
  if (source === null) throw new AppError('notFound', 'There is no such source.')
  return source
}
