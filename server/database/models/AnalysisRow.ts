import { Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize'
import type { EngineAnswer } from '#shared/types/structure'
import { id, json, text } from './columns'

/** What the engine answered to one question, kept under the hash of the question and the engine's version. */
export class AnalysisRow extends Model<InferAttributes<AnalysisRow>, InferCreationAttributes<AnalysisRow>> {
  declare id: CreationOptional<number>
  declare inputHash: string
  declare engineVersion: string
  declare result: EngineAnswer
  declare createdAt: string
}

export const defineAnalysisRow = (sequelize: Sequelize) => AnalysisRow.init({
  id: id(),
  inputHash: text(),
  engineVersion: text(),
  result: json<EngineAnswer>('result'),
  createdAt: text(),
}, {
  sequelize,
  tableName: 'analyses',
  indexes: [{ name: 'analyses_input', unique: true, fields: ['input_hash', 'engine_version'] }],
})
