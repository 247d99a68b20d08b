import { SourceRow } from '../../database/models/SourceRow'

/** Sets aside the source of record of a loop in a condition, if there is one. To be called in the transaction that chooses another. */
export async function setAsideOfRecord(loopId: number, conditionId: number, reason: string): Promise<void> {
  const former = await SourceRow.findOne({ where: { loopId, conditionId, ofRecord: true } })
  await former?.update({ ofRecord: false, setAsideReason: reason, version: former.version + 1 })
}
