import { Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize'
import { flag, id, text, textOrNull } from './columns'

/** A person with an account. No password hash: invited, and not yet there. */
export class PersonRow extends Model<InferAttributes<PersonRow>, InferCreationAttributes<PersonRow>> {
  declare id: CreationOptional<number>
  declare email: string
  declare name: string
  declare passwordHash: string | null
  declare isAdministrator: boolean
  declare disabledAt: string | null
  declare createdAt: string
}

export const definePersonRow = (sequelize: Sequelize) => PersonRow.init({
  id: id(),
  email: text(),
  name: text(),
  passwordHash: textOrNull(),
  isAdministrator: flag('isAdministrator'),
  disabledAt: textOrNull(),
  createdAt: text(),
}, {
  sequelize,
  tableName: 'people',
  indexes: [{ name: 'people_email', unique: true, fields: ['email'] }],
})
