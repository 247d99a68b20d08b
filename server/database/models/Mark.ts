import { DataTypes, Model, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize'
import { bytes, text } from './columns'

/** The mark of the brand, made safe before it was stored: at most one row, with id 1. */
export class Mark extends Model<InferAttributes<Mark>, InferCreationAttributes<Mark>> {
  declare id: number
  declare mediaType: string
  declare bytes: Buffer
  declare sha256: string
}

export const defineMark = (sequelize: Sequelize) => Mark.init({
  id: { type: DataTypes.INTEGER, primaryKey: true, allowNull: false },
  mediaType: text(),
  bytes: bytes(),
  sha256: text(),
}, {
  sequelize,
  tableName: 'marks',
})
