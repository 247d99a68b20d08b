import type { Report } from '#shared/types/report'
import type { ReportRow } from '../database/models/ReportRow'

export const presentReport = ({ id, version, systemId, title, documentNumber, loopIds, conditionIds, remarks, loopRemarks }: ReportRow): Report =>
  ({ id, version, systemId, title, documentNumber, loopIds, conditionIds, remarks, loopRemarks })

/** What those see who may read issued revisions only: nothing of the draft. */
export const presentReportOfIssues = (row: ReportRow): Report =>
  ({ ...presentReport(row), loopIds: [], conditionIds: [], remarks: '', loopRemarks: {} })
