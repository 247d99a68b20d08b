import { Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize'
import type { SourceDefinition, SourceKind } from '#shared/types/source'
import { flag, id, json, liveRows, text, textOrNull, whole, wholeOrNull } from './columns'

/** One origin of a loop's gain in a condition; one that is not deleted is of record. */
export class SourceRow extends Model<InferAttributes<SourceRow>, InferCreationAttributes<SourceRow>> {
  declare id: CreationOptional<number>
  declare loopId: number
  declare conditionId: number
  declare name: string
  declare kind: SourceKind
  declare definition: SourceDefinition
  declare uploadId: number | null
  declare ofRecord: boolean
  declare setAsideReason: string
  declare version: number
  declare createdAt: string
  declare deletedAt: CreationOptional<string | null>
}

export const defineSourceRow = (sequelize: Sequelize) => SourceRow.init({
  id: id(),
  loopId: whole(),
  conditionId: whole(),
  name: text(),
  kind: text(),
  definition: json<SourceDefinition>('definition'),
  uploadId: wholeOrNull(),
  ofRecord: flag('ofRecord'),
  setAsideReason: text(),
  version: whole(),
  createdAt: text(),
  deletedAt: textOrNull(),
}, {
  sequelize,
  tableName: 'sources',
  defaultScope: liveRows,
  indexes: [
    { name: 'sources_of_record', unique: true, fields: ['loop_id', 'condition_id'], where: { of_record: true, deleted_at: null } },
    { name: 'sources_loop', fields: ['loop_id', 'condition_id'] },
    { name: 'sources_condition', fields: ['condition_id'] },
    { name: 'sources_upload', fields: ['upload_id'] },
  ],
})
