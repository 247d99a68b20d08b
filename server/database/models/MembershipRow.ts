import { Model, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize'
import type { Role } from '#shared/types/person'
import { text, whole } from './columns'

/** A role of a person in a system; a person may hold several. */
export class MembershipRow extends Model<InferAttributes<MembershipRow>, InferCreationAttributes<MembershipRow>> {
  declare personId: number
  declare systemId: number
  declare role: Role
}

export const defineMembershipRow = (sequelize: Sequelize) => MembershipRow.init({
  personId: { ...whole(), primaryKey: true },
  systemId: { ...whole(), primaryKey: true },
  role: { ...text(), primaryKey: true },
}, {
  sequelize,
  tableName: 'memberships',
  indexes: [{ name: 'memberships_system', fields: ['system_id'] }],
})
