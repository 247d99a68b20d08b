import type { ModelStatic } from 'sequelize'
import { BlockRow } from '../database/models/BlockRow'
import { ConditionRow } from '../database/models/ConditionRow'
import { JobRow } from '../database/models/JobRow'
import { LoopRow } from '../database/models/LoopRow'
import { ReportRow } from '../database/models/ReportRow'
import { RevisionRow } from '../database/models/RevisionRow'
import { SourceRow } from '../database/models/SourceRow'
import { SystemRow } from '../database/models/SystemRow'
import { UploadRow } from '../database/models/UploadRow'

/** `deleted`: the row itself may be a deleted one (to restore it); what it belongs to may not. */
export type SystemFinder = (id: number, deleted: boolean) => Promise<number | null>

const rowsOf = <Row extends ModelStatic<SystemRow | LoopRow | ConditionRow | BlockRow | SourceRow | ReportRow>>(model: Row, deleted: boolean): Row => deleted ? model.unscoped() as Row : model

const findSystem: SystemFinder = async (id, deleted) => (await rowsOf(SystemRow, deleted).findByPk(id, { attributes: ['id'] }))?.id ?? null

async function liveSystemOf(row: { systemId: number } | null): Promise<number | null> {
  return row === null ? null : findSystem(row.systemId, false)
}

const findOfLoop: SystemFinder = async (id, deleted) => liveSystemOf(await rowsOf(LoopRow, deleted).findByPk(id, { attributes: ['systemId'] }))
const findOfCondition: SystemFinder = async (id, deleted) => liveSystemOf(await rowsOf(ConditionRow, deleted).findByPk(id, { attributes: ['systemId'] }))
const findOfBlock: SystemFinder = async (id, deleted) => liveSystemOf(await rowsOf(BlockRow, deleted).findByPk(id, { attributes: ['systemId'] }))
const findOfReport: SystemFinder = async (id, deleted) => liveSystemOf(await rowsOf(ReportRow, deleted).findByPk(id, { attributes: ['systemId'] }))

const findOfSource: SystemFinder = async (id, deleted) => {
  const source = await rowsOf(SourceRow, deleted).findByPk(id, { attributes: ['loopId', 'conditionId'] })
  if (source === null) return null
  const [systemId, condition] = await Promise.all([findOfLoop(source.loopId, false), findOfCondition(source.conditionId, false)])
  return condition === null ? null : systemId
}

const findOfUpload: SystemFinder = async id => liveSystemOf(await UploadRow.findByPk(id, { attributes: ['systemId'] }))

const findOfRevision: SystemFinder = async (id) => {
  const revision = await RevisionRow.findByPk(id, { attributes: ['reportId'] })
  return revision === null ? null : findOfReport(revision.reportId, false)
}

const findOfJob: SystemFinder = async (id) => {
  const job = await JobRow.findByPk(id, { attributes: ['revisionId'] })
  return job === null ? null : findOfRevision(job.revisionId, false)
}

/** For each parameter of a route that names a row of a system: which system it is of, null where there is none. */
export const systemOfParam: Record<string, SystemFinder> = {
  systemId: findSystem,
  loopId: findOfLoop,
  conditionId: findOfCondition,
  blockId: findOfBlock,
  sourceId: findOfSource,
  uploadId: findOfUpload,
  reportId: findOfReport,
  revisionId: findOfRevision,
  otherId: findOfRevision,
  jobId: findOfJob,
}
