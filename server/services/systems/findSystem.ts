import { AppError } from '#shared/errors/AppError'
import { SystemRow } from '../../database/models/SystemRow'

/** A system by id; throws 'not found'. */
export async function findSystem(systemId: number): Promise<SystemRow> {
  const system = await SystemRow.findByPk(systemId)
  if (system === null) throw new AppError('notFound', 'There is no such system.')
  return system
}
