import { Model, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize'
import { real, whole } from './columns'

/** The value of a parameter in one operating condition. */
export class ParameterValue extends Model<InferAttributes<ParameterValue>, InferCreationAttributes<ParameterValue>> {
  declare parameterId: number
  declare conditionId: number
  declare value: number
}

export const defineParameterValue = (sequelize: Sequelize) => ParameterValue.init({
  parameterId: { ...whole(), primaryKey: true },
  conditionId: { ...whole(), primaryKey: true },
  value: real(),
}, {
  sequelize,
  tableName: 'parameter_values',
  indexes: [{ name: 'parameter_values_condition', fields: ['condition_id'] }],
})
