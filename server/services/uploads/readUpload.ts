import { AppError } from '#shared/errors/AppError'
import { UploadRow } from '../../database/models/UploadRow'

/** An uploaded file as it came. Throws 'not found'. */
export async function readUpload(uploadId: number): Promise<{ fileName: string, sha256: string, bytes: Buffer }> {
  const upload = await UploadRow.unscoped().findByPk(uploadId)
  if (upload === null) throw new AppError('notFound', 'There is no such file.')
  return { fileName: upload.fileName, sha256: upload.sha256, bytes: upload.bytes }
}
