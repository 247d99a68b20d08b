import { DataTypes, Model, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize'
import type { PageSize } from '#shared/types/brand'
import { text, whole } from './columns'

/** The team that issues the reports, and its brand: one row, with id 1. */
export class Organisation extends Model<InferAttributes<Organisation>, InferCreationAttributes<Organisation>> {
  declare id: number
  declare teamName: string
  declare accent: string
  declare addressLine: string
  declare pageSize: PageSize
  declare version: number
}

export const defineOrganisation = (sequelize: Sequelize) => Organisation.init({
  id: { type: DataTypes.INTEGER, primaryKey: true, allowNull: false },
  teamName: text(),
  accent: text(),
  addressLine: text(),
  pageSize: text(),
  version: whole(),
}, {
  sequelize,
  tableName: 'organisation',
})
