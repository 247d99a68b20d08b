import { UploadRow } from '../../database/models/UploadRow'
import { nowOf, type ServiceContext } from '../context'

/** Copies an uploaded file into another system, so that who may see that one may see its files; returns the new id. */
export async function copyUpload(uploadId: number, systemId: number, context: ServiceContext): Promise<number> {
  const { fileName, size, sha256, bytes, uploadedBy } = await UploadRow.unscoped().findByPk(uploadId, { rejectOnEmpty: true })
  return (await UploadRow.create({ systemId, fileName, size, sha256, bytes, uploadedBy, createdAt: nowOf(context) })).id
}
