import { Op } from 'sequelize'
import { writeTransaction } from '../../database/database'
import { BlockGainRow } from '../../database/models/BlockGainRow'
import { BlockRow } from '../../database/models/BlockRow'
import { SourceRow } from '../../database/models/SourceRow'
import { UploadRow } from '../../database/models/UploadRow'

/** ms; a form may stay open this long between an upload and what uses it */
const grace = 24 * 3600 * 1000

/** Removes files that no source and no block, deleted ones included, has come to use within a day; returns how many. */
export function removeUnusedUploads(clock: () => Date): Promise<number> {
  return writeTransaction(async () => {
    const where = { uploadId: { [Op.ne]: null } }
    const used = [
      ...await SourceRow.unscoped().findAll({ where, attributes: ['uploadId'], group: ['uploadId'] }),
      ...await BlockRow.unscoped().findAll({ where, attributes: ['uploadId'], group: ['uploadId'] }),
      ...await BlockGainRow.findAll({ where, attributes: ['uploadId'], group: ['uploadId'] }),
    ]
    const before = new Date(clock().getTime() - grace).toISOString()
    return UploadRow.destroy({ where: { createdAt: { [Op.lt]: before }, id: { [Op.notIn]: used.map(row => row.uploadId as number) } } })
  })
}
