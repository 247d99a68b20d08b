import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { ReportRow } from '../../database/models/ReportRow'
import { nowOf, type ServiceContext } from '../context'
import { assertNothingIssued } from '../revisions/assertNothingIssued'
import { findSystem } from './findSystem'

/** Takes a system, and with it all it holds, out of sight until it is restored. Throws 'refused' where a revision of it was issued. */
export function deleteSystem(systemId: number, context: ServiceContext): Promise<{ id: number }> {
  return writeTransaction(async () => {
    const system = await findSystem(systemId)
    const reports = await ReportRow.findAll({ where: { systemId }, attributes: ['id'] })
    await assertNothingIssued(reports.map(report => report.id), 'This system')
    await system.update({ deletedAt: nowOf(context) })
    await recordAudit(context, 'system deleted', { systemId, subjectId: systemId, payload: { name: system.name } })
    return { id: systemId }
  })
}
