import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { nowOf, type ServiceContext } from '../context'
import { assertNothingIssued } from '../revisions/assertNothingIssued'
import { findReport } from './findReport'

/** Takes a report out of sight until it is restored; its revisions stay stored, unchanged. Throws 'refused' where one was issued. */
export function deleteReport(reportId: number, context: ServiceContext): Promise<{ id: number }> {
  return writeTransaction(async () => {
    const report = await findReport(reportId)
    await assertNothingIssued([reportId], 'This report')
    await report.update({ deletedAt: nowOf(context) })
    await recordAudit(context, 'report deleted', { systemId: report.systemId, subjectId: reportId, payload: { title: report.title } })
    return { id: reportId }
  })
}
