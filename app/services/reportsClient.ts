import type { Criterion } from '#shared/types/criterion'
import type { Report, Revision } from '#shared/types/report'
import type { Role } from '#shared/types/person'
import type { Loop, OperatingCondition, System } from '#shared/types/system'
import { callApi } from './apiClient'

export interface ReportWithRevisions {
  report: Report
  /** newest first */
  revisions: Revision[]
}

export interface ReportDetail extends ReportWithRevisions {
  system: System
  loops: Loop[]
  conditions: OperatingCondition[]
  criteria: Criterion[]
  roles: Role[]
}

export type ReportFields = Pick<Report, 'title' | 'documentNumber' | 'loopIds' | 'conditionIds' | 'remarks' | 'loopRemarks'>

const at = (reportId: number) => `/api/reports/${reportId}`

/** Routes of reports. */
export const reportsClient = {
  list: (systemId: number) => callApi<ReportWithRevisions[]>('GET', `/api/systems/${systemId}/reports`),
  create: (systemId: number, fields: { title: string, documentNumber: string }) => callApi<Report>('POST', `/api/systems/${systemId}/reports`, { body: fields }),
  read: (reportId: number) => callApi<ReportDetail>('GET', at(reportId)),
  change: (reportId: number, fields: Partial<ReportFields> & { version: number }) => callApi<Report>('PATCH', at(reportId), { body: fields }),
  remove: (reportId: number) => callApi<{ id: number }>('DELETE', at(reportId)),
  restore: (reportId: number) => callApi<Report>('POST', `${at(reportId)}/restore`),
  freeze: (reportId: number, changeNote: string) => callApi<Revision>('POST', `${at(reportId)}/revisions`, { body: { changeNote } }),
  previewPath: (reportId: number) => `${at(reportId)}/preview`,
}
