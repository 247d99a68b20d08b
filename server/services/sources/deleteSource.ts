import { AppError } from '#shared/errors/AppError'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { SourceRow } from '../../database/models/SourceRow'
import { nowOf, type ServiceContext } from '../context'
import { findSource } from './findSource'
import { findSystemOfSource } from './findSystemOfSource'

/** Takes a source out of sight until it is restored. Throws 'refused' for the one of record while there are others. */
export function deleteSource(sourceId: number, context: ServiceContext): Promise<{ id: number }> {
  return writeTransaction(async () => {
    const source = await findSource(sourceId)
    const { loopId, conditionId } = source
    if (source.ofRecord && await SourceRow.count({ where: { loopId, conditionId } }) > 1) {
      throw new AppError('refused', 'This source is of record. Choose another one to be of record first.')
    }
    const { id: systemId } = await findSystemOfSource(source)
    await source.update({ deletedAt: nowOf(context) })
    await recordAudit(context, 'source deleted', { systemId, subjectId: sourceId, payload: { name: source.name } })
    return { id: sourceId }
  })
}
