import { Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize'
import type { ArtefactKind, Edition } from '#shared/types/report'
import { id, text, whole } from './columns'

/** A file of a revision; its bytes are in `ArtefactBlob`. */
export class ArtefactRow extends Model<InferAttributes<ArtefactRow>, InferCreationAttributes<ArtefactRow>> {
  declare id: CreationOptional<number>
  declare revisionId: number
  declare edition: Edition
  declare kind: ArtefactKind
  declare fileName: string
  declare mediaType: string
  declare size: number
  declare sha256: string
}

export const defineArtefactRow = (sequelize: Sequelize) => ArtefactRow.init({
  id: id(),
  revisionId: whole(),
  edition: text(),
  kind: text(),
  fileName: text(),
  mediaType: text(),
  size: whole(),
  sha256: text(),
}, {
  sequelize,
  tableName: 'artefacts',
  indexes: [{ name: 'artefacts_kind', unique: true, fields: ['revision_id', 'edition', 'kind'] }, { name: 'artefacts_sha256', fields: ['sha256'] }],
})
