import { Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize'
import { id, text, textOrNull, whole } from './columns'

/** A link sent by mail that sets a password once. Holds the SHA-256 of what stands in the link. */
export class PersonToken extends Model<InferAttributes<PersonToken>, InferCreationAttributes<PersonToken>> {
  declare id: CreationOptional<number>
  declare personId: number
  declare purpose: 'invitation' | 'reset'
  declare tokenHash: string
  declare createdAt: string
  declare expiresAt: string
  declare usedAt: string | null
}

export const definePersonToken = (sequelize: Sequelize) => PersonToken.init({
  id: id(),
  personId: whole(),
  purpose: text(),
  tokenHash: text(),
  createdAt: text(),
  expiresAt: text(),
  usedAt: textOrNull(),
}, {
  sequelize,
  tableName: 'person_tokens',
  indexes: [{ name: 'person_tokens_token_hash', unique: true, fields: ['token_hash'] }, { name: 'person_tokens_person', fields: ['person_id'] }],
})
