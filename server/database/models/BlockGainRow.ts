import { Model, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize'
import type { BlockDefinition } from '#shared/types/block'
import { json, whole, wholeOrNull } from './columns'

/** The gain of a block in one operating condition, where it differs from the block's own. */
export class BlockGainRow extends Model<InferAttributes<BlockGainRow>, InferCreationAttributes<BlockGainRow>> {
  declare blockId: number
  declare conditionId: number
  declare definition: BlockDefinition
  declare uploadId: number | null
}

export const defineBlockGainRow = (sequelize: Sequelize) => BlockGainRow.init({
  blockId: { ...whole(), primaryKey: true },
  conditionId: { ...whole(), primaryKey: true },
  definition: json<BlockDefinition>('definition'),
  uploadId: wholeOrNull(),
}, {
  sequelize,
  tableName: 'block_gains',
  indexes: [{ name: 'block_gains_condition', fields: ['condition_id'] }, { name: 'block_gains_upload', fields: ['upload_id'] }],
})
