import { Model, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize'
import type { CriterionQuantity } from '#shared/types/criterion'
import { realOrNull, text, whole } from './columns'

/** One limit of a system on one quantity; null is no limit. */
export class CriterionRow extends Model<InferAttributes<CriterionRow>, InferCreationAttributes<CriterionRow>> {
  declare systemId: number
  declare quantity: CriterionQuantity
  declare limitValue: number | null
}

export const defineCriterionRow = (sequelize: Sequelize) => CriterionRow.init({
  systemId: { ...whole(), primaryKey: true },
  quantity: { ...text(), primaryKey: true },
  limitValue: realOrNull(),
}, {
  sequelize,
  tableName: 'criteria',
})
