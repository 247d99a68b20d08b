import { AppError } from '#shared/errors/AppError'
import type { Report } from '#shared/types/report'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { ReportRow } from '../../database/models/ReportRow'
import { presentReport } from '../../presenters/presentReport'
import type { ServiceContext } from '../context'

/** Brings a deleted report back; one that is there already stays as it is. */
export function restoreReport(reportId: number, context: ServiceContext): Promise<Report> {
  return writeTransaction(async () => {
    const report = await ReportRow.unscoped().findByPk(reportId)
    if (report === null) throw new AppError('notFound', 'There is no such report.')
    if (report.deletedAt !== null) {
      await report.update({ deletedAt: null })
      await recordAudit(context, 'report restored', { systemId: report.systemId, subjectId: reportId })
    }
    return presentReport(report)
  })
}
