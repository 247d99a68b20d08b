import { Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize'
import { id, json, text, textOrNull, wholeOrNull } from './columns'

/** Something that changed state, by whom and when. Only ever added. */
export class AuditEvent extends Model<InferAttributes<AuditEvent>, InferCreationAttributes<AuditEvent>> {
  declare id: CreationOptional<number>
  declare at: string
  declare event: string
  declare personId: number | null
  declare personName: string
  declare systemId: number | null
  declare subjectId: string | null
  declare payload: Record<string, unknown>
}

export const defineAuditEvent = (sequelize: Sequelize) => AuditEvent.init({
  id: id(),
  at: text(),
  event: text(),
  personId: wholeOrNull(),
  personName: text(),
  systemId: wholeOrNull(),
  subjectId: textOrNull(),
  payload: json<Record<string, unknown>>('payload'),
}, {
  sequelize,
  tableName: 'audit_events',
  indexes: [{ name: 'audit_events_system', fields: ['system_id'] }],
})
