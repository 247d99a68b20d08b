import { Model, Op, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize'
import type { RevisionState } from '#shared/types/report'
import { id, text, textOrNull, whole, wholeOrNull } from './columns'

/** One frozen state of a report. The snapshot is large and read only where it is asked for: `RevisionRow.unscoped()`. */
export class RevisionRow extends Model<InferAttributes<RevisionRow>, InferCreationAttributes<RevisionRow>> {
  declare id: CreationOptional<number>
  declare reportId: number
  declare letter: string
  declare draftNumber: number
  declare state: RevisionState
  declare changeNote: string
  declare snapshot: string
  declare snapshotSha256: string
  declare frozenBy: number
  declare frozenByName: string
  declare frozenAt: string
  declare issuedBy: CreationOptional<number | null>
  declare issuedByName: CreationOptional<string | null>
  declare issuedAt: CreationOptional<string | null>
}

export const defineRevisionRow = (sequelize: Sequelize) => RevisionRow.init({
  id: id(),
  reportId: whole(),
  letter: text(),
  draftNumber: whole(),
  state: text(),
  changeNote: text(),
  snapshot: text(),
  snapshotSha256: text(),
  frozenBy: whole(),
  frozenByName: text(),
  frozenAt: text(),
  issuedBy: wholeOrNull(),
  issuedByName: textOrNull(),
  issuedAt: textOrNull(),
}, {
  sequelize,
  tableName: 'revisions',
  defaultScope: { attributes: { exclude: ['snapshot'] } },
  indexes: [
    { name: 'revisions_draft', unique: true, fields: ['report_id', 'letter', 'draft_number'] },
    { name: 'revisions_letter', unique: true, fields: ['report_id', 'letter'], where: { state: { [Op.ne]: 'draft' } } },
    { name: 'revisions_valid', unique: true, fields: ['report_id'], where: { state: 'issued' } },
  ],
})
