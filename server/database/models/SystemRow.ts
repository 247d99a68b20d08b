import { Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize'
import type { FrequencyUnit } from '#shared/types/analysis'
import { id, liveRows, text, textOrNull, whole } from './columns'

/** A system whose loops are analysed together. */
export class SystemRow extends Model<InferAttributes<SystemRow>, InferCreationAttributes<SystemRow>> {
  declare id: CreationOptional<number>
  declare name: string
  declare customer: string
  declare documentNumber: string
  declare frequencyUnit: FrequencyUnit
  declare description: string
  declare version: number
  declare createdAt: string
  declare deletedAt: CreationOptional<string | null>
}

export const defineSystemRow = (sequelize: Sequelize) => SystemRow.init({
  id: id(),
  name: text(),
  customer: text(),
  documentNumber: text(),
  frequencyUnit: text(),
  description: text(),
  version: whole(),
  createdAt: text(),
  deletedAt: textOrNull(),
}, {
  sequelize,
  tableName: 'systems',
  defaultScope: liveRows,
})
