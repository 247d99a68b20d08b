import { readMeasurement, type MeasurementReading } from '#shared/importers/readMeasurement'
import type { MeasurementMapping } from '#shared/types/source'
import { UploadReadings } from './UploadReadings'

const readings = new UploadReadings<MeasurementReading>('definition.uploadId')

/** The points of an uploaded response under a mapping, or every bad line. Throws 'invalid input' where there is no such upload in the system. */
export const readPoints = (systemId: number, uploadId: number, mapping: MeasurementMapping): Promise<MeasurementReading> =>
  readings.of(systemId, uploadId, mapping, text => readMeasurement(text, mapping))
