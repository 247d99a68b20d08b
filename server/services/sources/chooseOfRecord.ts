import type { Source } from '#shared/types/source'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { presentSource } from '../../presenters/presentSource'
import type { ServiceContext } from '../context'
import { findSource } from './findSource'
import { findSystemOfSource } from './findSystemOfSource'
import { setAsideOfRecord } from './setAsideOfRecord'

/** Makes a source the one of record; the former is set aside for this reason. */
export function chooseOfRecord(sourceId: number, setAsideReason: string, context: ServiceContext): Promise<Source> {
  return writeTransaction(async () => {
    const source = await findSource(sourceId)
    if (source.ofRecord) return presentSource(source)
    await setAsideOfRecord(source.loopId, source.conditionId, setAsideReason)
    await source.update({ ofRecord: true, setAsideReason: '', version: source.version + 1 })
    const { id: systemId } = await findSystemOfSource(source)
    await recordAudit(context, 'source chosen of record', { systemId, subjectId: sourceId, payload: { setAsideReason } })
    return presentSource(source)
  })
}
