import { AppError } from '#shared/errors/AppError'
import { readMeasurement, type MeasurementReading } from '#shared/importers/readMeasurement'
import type { MeasurementMapping } from '#shared/types/source'
import { UploadRow } from '../../database/models/UploadRow'
import { decodeText } from './decodeText'

/** Readings made lately by the hash of what was read, oldest first: an id could come again for another file after a write that was taken back. */
const lately = new Map<string, MeasurementReading>()
const mostKept = 64

/** The points of an uploaded response under a mapping, or every bad line. Throws 'invalid input' where there is no such upload in the system. */
export async function readPoints(systemId: number, uploadId: number, mapping: MeasurementMapping): Promise<MeasurementReading> {
  const found = await UploadRow.findOne({ where: { id: uploadId, systemId }, attributes: ['sha256'] })
  const key = JSON.stringify([found?.sha256, mapping])
  const kept = found && lately.get(key)
  if (kept) return kept
  const upload = found && await UploadRow.unscoped().findOne({ where: { id: uploadId, systemId } })
  if (upload === null) throw new AppError('invalidInput', 'The uploaded file is no longer there. Upload it again.', { path: 'definition.uploadId' })
  const reading = readMeasurement(decodeText(upload.bytes), mapping)
  lately.set(key, reading)
  for (const oldest of lately.keys()) {
    if (lately.size <= mostKept) break
    lately.delete(oldest)
  }
  return reading
}
