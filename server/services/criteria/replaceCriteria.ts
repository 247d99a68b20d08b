import type { Criterion } from '#shared/types/criterion'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { CriterionRow } from '../../database/models/CriterionRow'
import type { ServiceContext } from '../context'
import { listCriteria } from './listCriteria'

/** Sets the criteria of a system; a quantity that is not named has no limit. */
export function replaceCriteria(systemId: number, criteria: Criterion[], context: ServiceContext): Promise<Criterion[]> {
  return writeTransaction(async () => {
    const before = await listCriteria(systemId)
    await CriterionRow.destroy({ where: { systemId } })
    await CriterionRow.bulkCreate(criteria.map(({ quantity, limit }) => ({ systemId, quantity, limitValue: limit })))
    const after = await listCriteria(systemId)
    await recordAudit(context, 'criteria changed', { systemId, payload: { before, after } })
    return after
  })
}
