import type { Report, Revision } from '#shared/types/report'
import { ReportRow } from '../../database/models/ReportRow'
import { presentReport, presentReportOfIssues } from '../../presenters/presentReport'
import { listRevisions } from '../revisions/listRevisions'
import type { RevisionReader } from '../revisions/RevisionReader'

export interface ReportWithRevisions {
  report: Report
  revisions: Revision[]
}

/** The reports of a system with their revisions, newest first. Who may read issued revisions only sees reports that have one. */
export async function listReports(systemId: number, reader: RevisionReader): Promise<ReportWithRevisions[]> {
  const rows = await ReportRow.findAll({ where: { systemId }, order: [['id', 'ASC']] })
  const reports = await Promise.all(rows.map(async row => ({
    report: reader.seesDrafts ? presentReport(row) : presentReportOfIssues(row),
    revisions: await listRevisions(row.id, reader),
  })))
  return reader.seesDrafts ? reports : reports.filter(({ revisions }) => revisions.length > 0)
}
