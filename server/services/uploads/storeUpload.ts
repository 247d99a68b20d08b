import { createHash } from 'node:crypto'
import { AppError } from '#shared/errors/AppError'
import { limits } from '#shared/schemas/limits'
import type { Upload } from '#shared/types/source'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { UploadRow } from '../../database/models/UploadRow'
import { presentUpload } from '../../presenters/presentUpload'
import { nowOf, type ServiceContext } from '../context'

/** The last part of a name, without what a file system or a header could stumble over, nor half a character where it was cut; never used as a path. */
const tidyName = (name: string) => name.replace(/^.*[\\/]/, '').replace(/\p{Cc}/gu, '').trim().slice(0, limits.name).replace(/\p{Cs}/gu, '').trim() || 'measurement.csv'

/** Keeps an uploaded file byte for byte. Throws 'invalid input' for an empty one. */
export async function storeUpload(systemId: number, file: { name: string, bytes: Buffer }, context: ServiceContext): Promise<Upload> {
  const { bytes } = file
  if (bytes.length === 0) throw new AppError('invalidInput', 'The file is empty.', { path: 'file' })
  return writeTransaction(async () => {
    const sha256 = createHash('sha256').update(bytes).digest('hex')
    const upload = await UploadRow.create({ systemId, fileName: tidyName(file.name), size: bytes.length, sha256, bytes, uploadedBy: context.actor.id, createdAt: nowOf(context) })
    await recordAudit(context, 'file uploaded', { systemId, subjectId: upload.id, payload: { fileName: upload.fileName, size: upload.size, sha256 } })
    return presentUpload(upload)
  })
}
