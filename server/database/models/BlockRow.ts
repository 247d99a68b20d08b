import { Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize'
import type { BlockDefinition, BlockRole } from '#shared/types/block'
import { id, jsonOrNull, liveRows, text, textOrNull, whole, wholeOrNull } from './columns'

/** A named part of a system that loop gains are built from, with its gain wherever a condition has none of its own. */
export class BlockRow extends Model<InferAttributes<BlockRow>, InferCreationAttributes<BlockRow>> {
  declare id: CreationOptional<number>
  declare systemId: number
  declare name: string
  declare role: BlockRole
  declare unitIn: string
  declare unitOut: string
  declare notes: string
  declare definition: BlockDefinition | null
  declare uploadId: number | null
  declare position: number
  declare version: number
  declare createdAt: string
  declare deletedAt: CreationOptional<string | null>
}

export const defineBlockRow = (sequelize: Sequelize) => BlockRow.init({
  id: id(),
  systemId: whole(),
  name: text(),
  role: text(),
  unitIn: text(),
  unitOut: text(),
  notes: text(),
  definition: jsonOrNull<BlockDefinition>('definition'),
  uploadId: wholeOrNull(),
  position: whole(),
  version: whole(),
  createdAt: text(),
  deletedAt: textOrNull(),
}, {
  sequelize,
  tableName: 'blocks',
  defaultScope: liveRows,
  indexes: [
    { name: 'blocks_system', fields: ['system_id', 'position'] },
    { name: 'blocks_name', unique: true, fields: ['system_id', 'name'], where: { deleted_at: null } },
    { name: 'blocks_upload', fields: ['upload_id'] },
  ],
})
