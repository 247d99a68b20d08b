import { Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize'
import type { OperatingCondition } from '#shared/types/system'
import { id, json, liveRows, text, textOrNull, whole } from './columns'

/** An operating condition of a system: one state in which all its loops are looked at. */
export class ConditionRow extends Model<InferAttributes<ConditionRow>, InferCreationAttributes<ConditionRow>> {
  declare id: CreationOptional<number>
  declare systemId: number
  declare code: string
  declare name: string
  declare coordinates: OperatingCondition['coordinates']
  declare tags: string[]
  declare notes: string
  declare position: number
  declare version: number
  declare createdAt: string
  declare deletedAt: CreationOptional<string | null>
}

export const defineConditionRow = (sequelize: Sequelize) => ConditionRow.init({
  id: id(),
  systemId: whole(),
  code: text(),
  name: text(),
  coordinates: json<OperatingCondition['coordinates']>('coordinates'),
  tags: json<string[]>('tags'),
  notes: text(),
  position: whole(),
  version: whole(),
  createdAt: text(),
  deletedAt: textOrNull(),
}, {
  sequelize,
  tableName: 'operating_conditions',
  defaultScope: liveRows,
  indexes: [{ name: 'operating_conditions_system', fields: ['system_id', 'position'] }, { name: 'operating_conditions_code', unique: true, fields: ['system_id', 'code'], where: { deleted_at: null } }],
})
