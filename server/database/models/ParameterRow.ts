import { Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize'
import { id, text, whole } from './columns'

/** A named number of a system that expressions use. */
export class ParameterRow extends Model<InferAttributes<ParameterRow>, InferCreationAttributes<ParameterRow>> {
  declare id: CreationOptional<number>
  declare systemId: number
  declare name: string
  declare unit: string
  declare notes: string
  declare position: number
  declare version: number
}

export const defineParameterRow = (sequelize: Sequelize) => ParameterRow.init({
  id: id(),
  systemId: whole(),
  name: text(),
  unit: text(),
  notes: text(),
  position: whole(),
  version: whole(),
}, {
  sequelize,
  tableName: 'parameters',
  indexes: [{ name: 'parameters_system', fields: ['system_id', 'position'] }],
})
