import type { MatricesQuestion } from '#shared/schemas/block'
import type { MatricesFound } from '#shared/types/block'
import { readMatrixUpload } from '../uploads/readMatrixUpload'

/** What an uploaded file of matrices holds, or every fault of it by its line. */
export async function listMatrices(systemId: number, { uploadId, states, outputs }: MatricesQuestion): Promise<MatricesFound> {
  const { sets, problems } = await readMatrixUpload(systemId, uploadId, { states, outputs })
  return {
    sets: sets.map(({ name, a, b, c, inputs, outputs, sampleTime = null }) => ({ name, states: a.length, inputCount: b[0]?.length ?? 0, outputCount: c.length, inputs, outputs, sampleTime })),
    problems,
  }
}
