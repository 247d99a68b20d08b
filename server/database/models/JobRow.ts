import { Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize'
import type { Edition, JobState } from '#shared/types/report'
import { id, text, textOrNull, whole } from './columns'

/** Work of the server that takes long and survives a restart. */
export class JobRow extends Model<InferAttributes<JobRow>, InferCreationAttributes<JobRow>> {
  declare id: CreationOptional<number>
  declare kind: 'renderRevision'
  declare revisionId: number
  declare edition: Edition
  declare state: JobState
  declare step: string
  declare done: number
  declare total: number
  declare error: CreationOptional<string | null>
  declare attempts: number
  declare leaseUntil: CreationOptional<string | null>
  declare requestedBy: number
  declare createdAt: string
  declare finishedAt: CreationOptional<string | null>
}

export const defineJobRow = (sequelize: Sequelize) => JobRow.init({
  id: id(),
  kind: text(),
  revisionId: whole(),
  edition: text(),
  state: text(),
  step: text(),
  done: whole(),
  total: whole(),
  error: textOrNull(),
  attempts: whole(),
  leaseUntil: textOrNull(),
  requestedBy: whole(),
  createdAt: text(),
  finishedAt: textOrNull(),
}, {
  sequelize,
  tableName: 'jobs',
  indexes: [
    { name: 'jobs_revision', fields: ['revision_id'] },
    { name: 'jobs_state', fields: ['state'] },
    { name: 'jobs_open', unique: true, fields: ['revision_id', 'edition'], where: { state: ['queued', 'running'] } },
  ],
})
