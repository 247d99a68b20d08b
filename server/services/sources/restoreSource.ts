import { AppError } from '#shared/errors/AppError'
import type { Source } from '#shared/types/source'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { SourceRow } from '../../database/models/SourceRow'
import { presentSource } from '../../presenters/presentSource'
import type { ServiceContext } from '../context'
import { findSystemOfSource } from './findSystemOfSource'

/** Brings a deleted source back: of record where there is none, set aside where another has become so. */
export function restoreSource(sourceId: number, context: ServiceContext): Promise<Source> {
  return writeTransaction(async () => {
    const source = await SourceRow.unscoped().findByPk(sourceId)
    if (source === null) throw new AppError('notFound', 'There is no such source.')
    if (source.deletedAt === null) return presentSource(source)
    const { loopId, conditionId } = source
    const other = await SourceRow.findOne({ where: { loopId, conditionId, ofRecord: true } })
    const setAsideReason = other === null ? '' : source.setAsideReason || `deleted, meanwhile replaced by ${other.name}`
    await source.update({ deletedAt: null, ofRecord: other === null, setAsideReason, version: source.version + 1 })
    const { id: systemId } = await findSystemOfSource(source)
    await recordAudit(context, 'source restored', { systemId, subjectId: sourceId, payload: { ofRecord: source.ofRecord } })
    return presentSource(source)
  })
}
