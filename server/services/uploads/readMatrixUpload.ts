import { readMatrices, type MatrixReading, type PlainShape } from '#shared/importers/readMatrices'
import { UploadReadings } from './UploadReadings'

const readings = new UploadReadings<MatrixReading>('uploadId')

/** The sets of matrices in an uploaded file, or every fault by its line. Throws 'invalid input' at `uploadId` where there is no such upload in the system. */
export const readMatrixUpload = (systemId: number, uploadId: number, shape: PlainShape): Promise<MatrixReading> =>
  readings.of(systemId, uploadId, [shape.states, shape.outputs ?? null], text => readMatrices(text, shape))
