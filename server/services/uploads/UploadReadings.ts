import { AppError } from '#shared/errors/AppError'
import { UploadRow } from '../../database/models/UploadRow'
import { decodeText } from './decodeText'
import { KeptValues } from './KeptValues'

/** Bytes of the files whose readings are kept: those of a system with a file for each of its conditions. */
const mostBytes = 64 * 1024 * 1024

/** Uploaded files as they were read. The readings used last are kept by the hash of what was read: an id could come again for another file after a write that was taken back. */
export class UploadReadings<Reading> {
  readonly #kept = new KeptValues<Reading>(mostBytes)
  readonly #path: string

  /** @param path of the field that names an upload, in what is refused */
  constructor(path: string) {
    this.#path = path
  }

  /**
   * What `read` makes of an upload of a system. Throws 'invalid input' where there is no such upload in the system.
   *
   * @param how all that the reading depends on beside the text
   */
  async of(systemId: number, uploadId: number, how: unknown, read: (text: string) => Reading): Promise<Reading> {
    const found = await UploadRow.findOne({ where: { id: uploadId, systemId }, attributes: ['sha256'] })
    const key = JSON.stringify([found?.sha256, how])
    const kept = found && this.#kept.get(key)
    if (kept) return kept
    const upload = found && await UploadRow.unscoped().findOne({ where: { id: uploadId, systemId } })
    if (upload === null) throw new AppError('invalidInput', 'The uploaded file is no longer there. Upload it again.', { path: this.#path })
    const reading = read(decodeText(upload.bytes))
    this.#kept.set(key, reading, upload.bytes.length)
    return reading
  }
}
