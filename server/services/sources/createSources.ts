import { AppError } from '#shared/errors/AppError'
import type { NewSource } from '#shared/schemas/source'
import type { Source } from '#shared/types/source'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { ConditionRow } from '../../database/models/ConditionRow'
import { SourceRow } from '../../database/models/SourceRow'
import { presentSource } from '../../presenters/presentSource'
import { nowOf, type ServiceContext } from '../context'
import { findLoop } from '../loops/findLoop'
import { findSystem } from '../systems/findSystem'
import { assertDefinition } from './assertDefinition'
import { setAsideOfRecord } from './setAsideOfRecord'

/**
 * Gives a loop a new source in each of these conditions. One of record sets the former aside; the first of a loop in a condition is of record in any
 * case, since exactly one is. Throws where the definition is refused; then nothing is stored.
 */
export async function createSources(loopId: number, fields: NewSource, context: ServiceContext): Promise<Source[]> {
  const { conditionIds, name, definition } = fields
  const { systemId } = await findLoop(loopId)
  await assertDefinition(definition, await findSystem(systemId), conditionIds)
  return writeTransaction(async () => {
    await findLoop(loopId)
    const known = new Set((await ConditionRow.findAll({ where: { systemId, id: conditionIds }, attributes: ['id'] })).map(condition => condition.id))
    const stray = conditionIds.findIndex(id => !known.has(id))
    if (stray >= 0) throw new AppError('invalidInput', 'There is no such operating condition in this system.', { path: `conditionIds[${stray}]` })
    const created: SourceRow[] = []
    for (const conditionId of conditionIds) {
      const ofRecord = fields.ofRecord || await SourceRow.count({ where: { loopId, conditionId, ofRecord: true } }) === 0
      if (ofRecord) await setAsideOfRecord(loopId, conditionId, `replaced by ${name}`)
      created.push(await SourceRow.create({
        loopId,
        conditionId,
        name,
        kind: definition.kind,
        definition,
        uploadId: definition.kind === 'measured' ? definition.uploadId : null,
        ofRecord,
        setAsideReason: ofRecord ? '' : fields.setAsideReason,
        version: 1,
        createdAt: nowOf(context),
      }))
    }
    for (const source of created) await recordAudit(context, 'source created', { systemId, subjectId: source.id, payload: { loopId, conditionId: source.conditionId, name, definition, ofRecord: source.ofRecord } })
    return created.map(presentSource)
  })
}
