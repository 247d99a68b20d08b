import type { ReportRow } from '../../database/models/ReportRow'
import { ReportRow as Reports } from '../../database/models/ReportRow'
import { RevisionRow } from '../../database/models/RevisionRow'
import { SourceRow } from '../../database/models/SourceRow'
import { listParameters } from '../parameters/listParameters'
import { readSystem } from '../systems/readSystem'
import { findBrand } from '../brand/findBrand'
import { sha256Of } from '../../reports/sha256Of'

/**
 * A fingerprint of the versions of every row a snapshot is made from. The snapshot is collected outside a transaction, for analyses may take
 * their time; equal stamps before it and inside the freezing transaction say that nothing changed on the way.
 */
export async function reportStamp(report: ReportRow): Promise<string> {
  const [newest, { system, loops, conditions, blocks, criteria }, parameters, revisions, brand] = await Promise.all([
    Reports.findByPk(report.id, { attributes: ['version'] }), readSystem(report.systemId), listParameters(report.systemId),
    RevisionRow.findAll({ where: { reportId: report.id }, attributes: ['id', 'state'], order: [['id', 'ASC']] }), findBrand(),
  ])
  const sources = await SourceRow.findAll({ where: { loopId: loops.map(({ id }) => id), conditionId: conditions.map(({ id }) => id) }, attributes: ['id', 'version'], order: ['id'] })
  const versions = (rows: readonly { id: number, version: number }[]) => rows.map(({ id, version }) => [id, version])
  return sha256Of(JSON.stringify([
    newest?.version, system.version, versions(loops), versions(conditions), versions(blocks), criteria, parameters, versions(sources), revisions.map(({ id, state }) => [id, state]), brand.version,
  ]))
}
