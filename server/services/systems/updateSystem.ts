import type { SystemChange } from '#shared/schemas/system'
import type { System } from '#shared/types/system'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { presentSystem } from '../../presenters/presentSystem'
import { assertNewest } from '../assertNewest'
import type { ServiceContext } from '../context'
import { findSystem } from './findSystem'

/** Changes the named fields of a system. Throws 'conflict' from an older version. */
export function updateSystem(systemId: number, { version, ...change }: SystemChange, context: ServiceContext): Promise<System> {
  return writeTransaction(async () => {
    const system = await findSystem(systemId)
    assertNewest(system, version, presentSystem(system))
    await system.update({ ...change, version: version + 1 })
    await recordAudit(context, 'system changed', { systemId, subjectId: systemId, payload: { ...change } })
    return presentSystem(system)
  })
}
