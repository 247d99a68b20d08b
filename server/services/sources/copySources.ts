import type { WhereOptions } from 'sequelize'
import { SourceRow } from '../../database/models/SourceRow'
import { nowOf, type ServiceContext } from '../context'

interface Place {
  loopId: number
  conditionId: number
  /** of a measured response: the upload it points at there. @default the same */
  uploadId?: number
}

/** Copies the sources found by `where` to the places told by `placeOf` (null: not copied), each staying of record or not as it is. */
export async function copySources(where: WhereOptions<SourceRow>, placeOf: (source: SourceRow) => Place | null, context: ServiceContext): Promise<void> {
  const originals = await SourceRow.findAll({ where, order: ['id'] })
  await SourceRow.bulkCreate(originals.flatMap((source) => {
    const place = placeOf(source)
    if (place === null) return []
    const { name, kind, definition, ofRecord, setAsideReason } = source
    const uploadId = place.uploadId ?? source.uploadId
    return [{
      loopId: place.loopId,
      conditionId: place.conditionId,
      name,
      kind,
      definition: definition.kind === 'measured' && uploadId !== null ? { ...definition, uploadId } : definition,
      uploadId,
      ofRecord,
      setAsideReason,
      version: 1,
      createdAt: nowOf(context),
    }]
  }))
}
