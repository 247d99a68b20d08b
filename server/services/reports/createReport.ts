import type { NewReport } from '#shared/schemas/report'
import type { Report } from '#shared/types/report'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { ReportRow } from '../../database/models/ReportRow'
import { presentReport } from '../../presenters/presentReport'
import type { ServiceContext } from '../context'
import { nowOf } from '../context'
import { readSystem } from '../systems/readSystem'

/** A report of a system that covers every loop and condition there is, in their order. */
export function createReport(systemId: number, fields: NewReport, context: ServiceContext): Promise<Report> {
  return writeTransaction(async () => {
    const { loops, conditions } = await readSystem(systemId)
    const report = await ReportRow.create({
      ...fields, systemId, loopIds: loops.map(({ id }) => id), conditionIds: conditions.map(({ id }) => id), remarks: '', loopRemarks: {}, version: 1, createdAt: nowOf(context),
    })
    await recordAudit(context, 'report created', { systemId, subjectId: report.id, payload: { ...fields } })
    return presentReport(report)
  })
}
