import { createHash } from 'node:crypto'
import { limits } from '#shared/schemas/limits'
import type { InputFault } from '#shared/schemas/readBySchema'
import type { ManifestUpload } from '#shared/types/manifest'

export interface UploadBytes {
  fileName: string
  sha256: string
  bytes: Buffer
}

/** The bytes of a manifest's uploads, and what is wrong with them: not base 64, empty, too large, or not those of the hash they go under. */
export function readManifestUploads(uploads: readonly ManifestUpload[]): { uploads: UploadBytes[], faults: InputFault[] } {
  const faults: InputFault[] = []
  const read = uploads.map((upload, index): UploadBytes => {
    const { fileName, sha256 } = upload
    const path = `uploads[${index}]`
    const bytes = 'text' in upload ? Buffer.from(upload.text, 'utf8') : Buffer.from(upload.base64, 'base64')
    if ('base64' in upload && bytes.toString('base64') !== upload.base64) faults.push({ path: `${path}.base64`, message: 'This is not base 64 in one piece, with its padding and without line breaks.' })
    else if (bytes.length === 0) faults.push({ path, message: 'The file is empty.' })
    else if (bytes.length > limits.uploadBytes) faults.push({ path, message: `The file holds more than ${limits.uploadBytes.toLocaleString('en')} bytes.` })
    else {
      const found = createHash('sha256').update(bytes).digest('hex')
      if (found !== sha256) faults.push({ path: `${path}.sha256`, message: `The file ${fileName} has the SHA-256 ${found}: it is not the file that was meant, or it was changed on the way.` })
    }
    return { fileName, sha256, bytes }
  })
  return { uploads: read, faults }
}
