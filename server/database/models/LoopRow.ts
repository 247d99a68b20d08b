import { Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize'
import type { BreakAt, OtherLoopState } from '#shared/types/system'
import { id, json, jsonOrNull, liveRows, text, textOrNull, whole } from './columns'

/** A loop of a system: where it is opened and what the others do meanwhile. */
export class LoopRow extends Model<InferAttributes<LoopRow>, InferCreationAttributes<LoopRow>> {
  declare id: CreationOptional<number>
  declare systemId: number
  declare code: string
  declare name: string
  declare axis: string
  declare breakPoint: string
  declare otherLoops: string
  declare notes: string
  declare position: number
  declare version: number
  declare createdAt: string
  declare deletedAt: CreationOptional<string | null>
  /** the block it is opened at */
  declare breakAt: CreationOptional<BreakAt | null>
  /** the other loops that are not at nominal meanwhile */
  declare loopStates: OtherLoopState[]
}

export const defineLoopRow = (sequelize: Sequelize) => LoopRow.init({
  id: id(),
  systemId: whole(),
  code: text(),
  name: text(),
  axis: text(),
  breakPoint: text(),
  otherLoops: text(),
  notes: text(),
  position: whole(),
  version: whole(),
  createdAt: text(),
  deletedAt: textOrNull(),
  breakAt: jsonOrNull<BreakAt>('breakAt'),
  loopStates: json<OtherLoopState[]>('loopStates'),
}, {
  sequelize,
  tableName: 'loops',
  defaultScope: liveRows,
  indexes: [{ name: 'loops_system', fields: ['system_id', 'position'] }, { name: 'loops_code', unique: true, fields: ['system_id', 'code'], where: { deleted_at: null } }],
})
