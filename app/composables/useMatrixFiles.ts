import type { MeasurementProblem } from '#shared/importers/MeasurementProblem'
import { systemsClient } from '~/services/systemsClient'
import type { MatricesRead } from '~/workers/engine'

/** A file of state-space matrices, stored, with what it holds. */
export interface MatrixFile {
  uploadId: number
  fileName: string
  /** of plain stacked numbers */
  states: number | null
  sets: { name: string, states: number, inputs: string[], outputs: string[], inputCount: number, outputCount: number }[]
  problems: MeasurementProblem[]
  /** plain numbers, whose number of states only a person knows */
  isPlain: boolean
}

/** The files of matrices of the block that is open: stored as they are dropped, read in the worker. */
export function useMatrixFiles(systemId: number) {
  const engine = useEngine()
  const files = ref<MatrixFile[]>([])
  const busy = ref(false)

  const entry = (upload: { id: number, fileName: string }, states: number | null, read: MatricesRead): MatrixFile => ({
    uploadId: upload.id, fileName: upload.fileName, states, ...read,
  })
  function put(file: MatrixFile): void {
    // The same file, mended, takes the place of what was wrong.
    files.value = [...files.value.filter(other => other.uploadId !== file.uploadId && !(other.fileName === file.fileName && other.problems.length > 0)), file]
  }

  /** Stores and reads files that were dropped; resolves to those that are right. */
  async function take(chosen: readonly File[]): Promise<MatrixFile[]> {
    busy.value = true
    const taken: MatrixFile[] = []
    try {
      for (const file of chosen) {
        const upload = await systemsClient.upload(systemId, file)
        await engine().keepUpload(upload.id, await file.text())
        const read = entry(upload, null, await engine().readMatrices(upload.id, null))
        put(read)
        if (read.problems.length === 0) taken.push(read)
      }
    }
    finally {
      busy.value = false
    }
    return taken
  }

  /** Reads a file that is stored already. */
  async function open(uploadId: number, fileName: string, states: number | null): Promise<void> {
    if (files.value.some(file => file.uploadId === uploadId)) return
    put(entry({ id: uploadId, fileName }, states, await engine().readMatrices(uploadId, states)))
  }

  /** Reads it once more, its states known. */
  async function setStates(file: MatrixFile, states: number | null): Promise<MatrixFile> {
    const read = { ...entry({ id: file.uploadId, fileName: file.fileName }, states, await engine().readMatrices(file.uploadId, states)), isPlain: true }
    files.value = files.value.map(other => other.uploadId === file.uploadId ? read : other)
    return read
  }

  return { files, busy, take, open, setStates }
}
