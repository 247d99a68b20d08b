import { Model, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize'
import { bytes, text } from './columns'

/** The bytes of artefacts, kept once under their SHA-256. */
export class ArtefactBlob extends Model<InferAttributes<ArtefactBlob>, InferCreationAttributes<ArtefactBlob>> {
  declare sha256: string
  declare bytes: Buffer
}

export const defineArtefactBlob = (sequelize: Sequelize) => ArtefactBlob.init({
  sha256: { ...text(), primaryKey: true },
  bytes: bytes(),
}, {
  sequelize,
  tableName: 'artefact_blobs',
})
