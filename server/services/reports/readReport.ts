import { AppError } from '#shared/errors/AppError'
import type { Criterion } from '#shared/types/criterion'
import type { Role } from '#shared/types/person'
import type { Loop, OperatingCondition, System } from '#shared/types/system'
import { presentReport, presentReportOfIssues } from '../../presenters/presentReport'
import { listRevisions } from '../revisions/listRevisions'
import type { RevisionReader } from '../revisions/RevisionReader'
import { readSystem } from '../systems/readSystem'
import { findReport } from './findReport'
import type { ReportWithRevisions } from './listReports'

export interface ReportDetail extends ReportWithRevisions {
  system: System
  loops: Loop[]
  conditions: OperatingCondition[]
  criteria: Criterion[]
  roles: Role[]
}

/** A report with all its draft is made from; for who may read issued revisions only, these and the names of report and system. */
export async function readReport(reportId: number, reader: RevisionReader, roles: Role[]): Promise<ReportDetail> {
  const row = await findReport(reportId)
  const [{ system, loops, conditions, criteria }, revisions] = await Promise.all([readSystem(row.systemId), listRevisions(reportId, reader)])
  if (reader.seesDrafts) return { report: presentReport(row), system, loops, conditions, criteria, revisions, roles }
  if (revisions.length === 0) throw new AppError('notFound', 'There is no such report.')
  return { report: presentReportOfIssues(row), system: { ...system, description: '' }, loops: [], conditions: [], criteria: [], revisions, roles }
}
