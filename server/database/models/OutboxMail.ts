import { Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize'
import { id, text, textOrNull, whole } from './columns'

/** A mail of the application: waiting to be read here where no mail server is set, else sent or to be sent again. */
export class OutboxMail extends Model<InferAttributes<OutboxMail>, InferCreationAttributes<OutboxMail>> {
  declare id: CreationOptional<number>
  declare toName: string
  declare toAddress: string
  declare subject: string
  declare text: string
  declare createdAt: string
  declare sentAt: string | null
  declare attempts: number
  declare error: string | null
}

export const defineOutboxMail = (sequelize: Sequelize) => OutboxMail.init({
  id: id(),
  toName: text(),
  toAddress: text(),
  subject: text(),
  text: text(),
  createdAt: text(),
  sentAt: textOrNull(),
  attempts: whole(),
  error: textOrNull(),
}, {
  sequelize,
  tableName: 'outbox_mails',
})
