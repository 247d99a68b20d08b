import type { Sequelize } from 'sequelize'
import { defineAnalysisRow } from './AnalysisRow'
import { defineArtefactBlob } from './ArtefactBlob'
import { defineArtefactRow } from './ArtefactRow'
import { defineAuditEvent } from './AuditEvent'
import { defineBlockGainRow } from './BlockGainRow'
import { defineBlockRow } from './BlockRow'
import { defineConditionRow } from './ConditionRow'
import { defineCriterionRow } from './CriterionRow'
import { defineJobEvent } from './JobEvent'
import { defineJobRow } from './JobRow'
import { defineLoopRow } from './LoopRow'
import { defineMark } from './Mark'
import { defineMembershipRow } from './MembershipRow'
import { defineOrganisation } from './Organisation'
import { defineOutboxMail } from './OutboxMail'
import { defineParameterRow } from './ParameterRow'
import { defineParameterValue } from './ParameterValue'
import { definePersonRow } from './PersonRow'
import { definePersonToken } from './PersonToken'
import { defineReportRow } from './ReportRow'
import { defineRevisionRow } from './RevisionRow'
import { defineSessionRow } from './SessionRow'
import { defineSourceRow } from './SourceRow'
import { defineSystemRow } from './SystemRow'
import { defineUploadRow } from './UploadRow'

/** Binds every model to the open database and returns them. The tables themselves are made by the migrations. */
export const defineModels = (sequelize: Sequelize) => [
  defineAnalysisRow(sequelize),
  defineArtefactBlob(sequelize),
  defineArtefactRow(sequelize),
  defineAuditEvent(sequelize),
  defineBlockGainRow(sequelize),
  defineBlockRow(sequelize),
  defineConditionRow(sequelize),
  defineCriterionRow(sequelize),
  defineJobEvent(sequelize),
  defineJobRow(sequelize),
  defineLoopRow(sequelize),
  defineMark(sequelize),
  defineMembershipRow(sequelize),
  defineOrganisation(sequelize),
  defineOutboxMail(sequelize),
  defineParameterRow(sequelize),
  defineParameterValue(sequelize),
  definePersonRow(sequelize),
  definePersonToken(sequelize),
  defineReportRow(sequelize),
  defineRevisionRow(sequelize),
  defineSessionRow(sequelize),
  defineSourceRow(sequelize),
  defineSystemRow(sequelize),
  defineUploadRow(sequelize),
]
