import { defaultCriteria } from '#shared/analysis/criteria/defaultCriteria'
import type { NewSystem } from '#shared/schemas/system'
import type { System } from '#shared/types/system'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { CriterionRow } from '../../database/models/CriterionRow'
import { MembershipRow } from '../../database/models/MembershipRow'
import { SystemRow } from '../../database/models/SystemRow'
import { presentSystem } from '../../presenters/presentSystem'
import { nowOf, type ServiceContext } from '../context'

/** Makes a system with the customary criteria; its maker becomes its engineer. */
export function createSystem(fields: NewSystem, context: ServiceContext): Promise<System> {
  return writeTransaction(async () => {
    const system = await SystemRow.create({ ...fields, version: 1, createdAt: nowOf(context) })
    await MembershipRow.create({ personId: context.actor.id, systemId: system.id, role: 'engineer' })
    await CriterionRow.bulkCreate(defaultCriteria.map(({ quantity, limit }) => ({ systemId: system.id, quantity, limitValue: limit })))
    await recordAudit(context, 'system created', { systemId: system.id, subjectId: system.id, payload: { ...fields } })
    return presentSystem(system)
  })
}
