import { AppError } from '#shared/errors/AppError'
import { ReportRow } from '../../database/models/ReportRow'

/** A report by id; throws 'not found'. */
export async function findReport(reportId: number): Promise<ReportRow> {
  const report = await ReportRow.findByPk(reportId)
  if (report === null) throw new AppError('notFound', 'There is no such report.')
  return report
}
