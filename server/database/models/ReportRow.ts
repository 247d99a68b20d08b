import { Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize'
import { id, json, liveRows, text, textOrNull, whole } from './columns'

/** A report of a system: the document whose frozen states are its revisions. */
export class ReportRow extends Model<InferAttributes<ReportRow>, InferCreationAttributes<ReportRow>> {
  declare id: CreationOptional<number>
  declare systemId: number
  declare title: string
  declare documentNumber: string
  declare loopIds: number[]
  declare conditionIds: number[]
  declare remarks: string
  declare loopRemarks: Record<number, string>
  declare version: number
  declare createdAt: string
  declare deletedAt: CreationOptional<string | null>
}

export const defineReportRow = (sequelize: Sequelize) => ReportRow.init({
  id: id(),
  systemId: whole(),
  title: text(),
  documentNumber: text(),
  loopIds: json<number[]>('loopIds'),
  conditionIds: json<number[]>('conditionIds'),
  remarks: text(),
  loopRemarks: json<Record<number, string>>('loopRemarks'),
  version: whole(),
  createdAt: text(),
  deletedAt: textOrNull(),
}, {
  sequelize,
  tableName: 'reports',
  defaultScope: liveRows,
  indexes: [{ name: 'reports_system', fields: ['system_id'] }],
})
