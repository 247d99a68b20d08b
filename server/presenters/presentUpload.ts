import type { Upload } from '#shared/types/source'
import type { UploadRow } from '../database/models/UploadRow'

export const presentUpload = ({ id, fileName, size, sha256 }: UploadRow): Upload => ({ id, fileName, size, sha256 })
