import { Model, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize'
import { text, whole } from './columns'

/** A sign-in that is still good. Holds the SHA-256 of the secret in the cookie, never the secret. */
export class SessionRow extends Model<InferAttributes<SessionRow>, InferCreationAttributes<SessionRow>> {
  declare idHash: string
  declare personId: number
  declare createdAt: string
  declare lastSeenAt: string
  declare expiresAt: string
}

export const defineSessionRow = (sequelize: Sequelize) => SessionRow.init({
  idHash: { ...text(), primaryKey: true },
  personId: whole(),
  createdAt: text(),
  lastSeenAt: text(),
  expiresAt: text(),
}, {
  sequelize,
  tableName: 'sessions',
  indexes: [{ name: 'sessions_person', fields: ['person_id'] }],
})
