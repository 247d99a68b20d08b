import { Op } from 'sequelize'
import { writeTransaction } from '../../database/database'
import { SourceRow } from '../../database/models/SourceRow'
import { UploadRow } from '../../database/models/UploadRow'

/** ms; a form may stay open this long between an upload and its source */
const grace = 24 * 3600 * 1000

/** Removes files that no source, deleted ones included, has come to use within a day; returns how many. */
export function removeUnusedUploads(clock: () => Date): Promise<number> {
  return writeTransaction(async () => {
    const used = await SourceRow.unscoped().findAll({ where: { uploadId: { [Op.ne]: null } }, attributes: ['uploadId'], group: ['uploadId'] })
    const before = new Date(clock().getTime() - grace).toISOString()
    return UploadRow.destroy({ where: { createdAt: { [Op.lt]: before }, id: { [Op.notIn]: used.map(source => source.uploadId as number) } } })
  })
}
