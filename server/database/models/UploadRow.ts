import { Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize'
import { bytes, id, text, whole } from './columns'

/** An uploaded file, byte for byte. The bytes are read only where they are asked for: `UploadRow.unscoped()`. */
export class UploadRow extends Model<InferAttributes<UploadRow>, InferCreationAttributes<UploadRow>> {
  declare id: CreationOptional<number>
  declare systemId: number
  declare fileName: string
  declare size: number
  declare sha256: string
  declare bytes: Buffer
  declare uploadedBy: number
  declare createdAt: string
}

export const defineUploadRow = (sequelize: Sequelize) => UploadRow.init({
  id: id(),
  systemId: whole(),
  fileName: text(),
  size: whole(),
  sha256: text(),
  bytes: bytes(),
  uploadedBy: whole(),
  createdAt: text(),
}, {
  sequelize,
  tableName: 'uploads',
  defaultScope: { attributes: { exclude: ['bytes'] } },
  indexes: [{ name: 'uploads_system', fields: ['system_id'] }],
})
