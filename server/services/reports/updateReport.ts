import { AppError } from '#shared/errors/AppError'
import type { ReportChange } from '#shared/schemas/report'
import type { Report } from '#shared/types/report'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { presentReport } from '../../presenters/presentReport'
import { assertNewest } from '../assertNewest'
import type { ServiceContext } from '../context'
import { readSystem } from '../systems/readSystem'
import { findReport } from './findReport'

/** Throws 'invalid input' where an id in a list is none of this system's rows. */
function assertKnown(ids: readonly number[], rows: readonly { id: number }[], path: string, noun: string): void {
  const index = ids.findIndex(id => !rows.some(row => row.id === id))
  if (index >= 0) throw new AppError('invalidInput', `There is no such ${noun} in this system.`, { path: `${path}[${index}]` })
}

/** Changes the named fields of a report's draft. Throws 'conflict' from an older version, 'invalid input' for a loop or condition of another system. */
export function updateReport(reportId: number, { version, ...change }: ReportChange, context: ServiceContext): Promise<Report> {
  return writeTransaction(async () => {
    const report = await findReport(reportId)
    assertNewest(report, version, presentReport(report))
    const { loops, conditions } = await readSystem(report.systemId)
    assertKnown(change.loopIds ?? [], loops, 'loopIds', 'loop')
    assertKnown(change.conditionIds ?? [], conditions, 'conditionIds', 'operating condition')
    await report.update({ ...change, version: version + 1 })
    await recordAudit(context, 'report changed', { systemId: report.systemId, subjectId: reportId, payload: { fields: Object.keys(change) } })
    return presentReport(report)
  })
}
