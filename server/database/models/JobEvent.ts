import { Model, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize'
import type { Job } from '#shared/types/report'
import { json, text, whole } from './columns'

/** One step of a job's progress, in order; the payload is the job as it then was. */
export class JobEvent extends Model<InferAttributes<JobEvent>, InferCreationAttributes<JobEvent>> {
  declare jobId: number
  declare sequence: number
  declare payload: Job
  declare createdAt: string
}

export const defineJobEvent = (sequelize: Sequelize) => JobEvent.init({
  jobId: { ...whole(), primaryKey: true },
  sequence: { ...whole(), primaryKey: true },
  payload: json<Job>('payload'),
  createdAt: text(),
}, {
  sequelize,
  tableName: 'job_events',
})
