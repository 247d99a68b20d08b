import { AppError } from '#shared/errors/AppError'
import type { System } from '#shared/types/system'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { SystemRow } from '../../database/models/SystemRow'
import { presentSystem } from '../../presenters/presentSystem'
import type { ServiceContext } from '../context'

/** Brings a deleted system back; one that is there already stays as it is. */
export function restoreSystem(systemId: number, context: ServiceContext): Promise<System> {
  return writeTransaction(async () => {
    const system = await SystemRow.unscoped().findByPk(systemId)
    if (system === null) throw new AppError('notFound', 'There is no such system.')
    if (system.deletedAt !== null) {
      await system.update({ deletedAt: null })
      await recordAudit(context, 'system restored', { systemId, subjectId: systemId })
    }
    return presentSystem(system)
  })
}
