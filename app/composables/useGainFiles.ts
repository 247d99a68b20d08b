import type { Ref } from 'vue'
import type { MeasurementPreview } from '#shared/importers/previewMeasurement'
import { systemsClient } from '~/services/systemsClient'
import type { TypedBlock } from '~/services/TypedBlock'
import type { TypedGain } from '~/services/TypedGain'
import { useToastStore } from '~/stores/toasts'
import type { MatrixFile } from './useMatrixFiles'

interface GainPlace {
  systemId: number
  typed: Ref<TypedBlock>
  /** the gain looked at */
  gain: Ref<TypedGain | null>
  /** brings a stored file into the worker */
  keepUpload: (id: number) => Promise<void>
}

/** The files of a block's gains: matrices for one condition or for all in one step, and the sweep of a measured one. */
export function useGainFiles({ systemId, typed, gain, keepUpload }: GainPlace) {
  const toasts = useToastStore()
  const engine = useEngine()
  const matrices = useMatrixFiles(systemId)
  const preview = shallowRef<MeasurementPreview | null>(null)

  async function told(work: () => Promise<void>): Promise<void> {
    try {
      await work()
    }
    catch (error) {
      toasts.fail(error)
    }
  }

  // What of files is stored is read as soon as its gain is looked at.
  watch(() => [gain.value?.uploadId, gain.value?.kind] as const, ([uploadId, kind]) => told(async () => {
    preview.value = null
    if (!uploadId || gain.value === null) return
    const { fileName, states } = gain.value
    await keepUpload(uploadId)
    if (kind === 'stateSpace') await matrices.open(uploadId, fileName || 'The stored file', states)
    else if (kind === 'measured') preview.value = await engine().previewUpload(uploadId)
  }), { immediate: import.meta.client })

  const placeOf = (file: MatrixFile, set: string | undefined) => ({ uploadId: file.uploadId, fileName: file.fileName, states: file.states, set: file.sets.length === 1 ? null : set ?? null })

  const takeMatrices = (files: File[]) => told(async () => {
    const [first] = await matrices.take(files)
    if (first !== undefined && gain.value !== null) Object.assign(gain.value, placeOf(first, first.sets[0]?.name))
  })

  const setStates = (file: MatrixFile, text: string) => told(async () => {
    const states = parseNumberText(text)
    const read = await matrices.setStates(file, states !== null && Number.isInteger(states) && states > 0 ? states : null)
    if (read.problems.length === 0 && gain.value !== null) Object.assign(gain.value, placeOf(read, read.sets[0]?.name))
  })

  /** Gives each condition its set of matrices, with all else as it stands in the shared gain. */
  function assignSets(sets: Record<number, { uploadId: number, set: string }>) {
    const base = typed.value.shared
    if (base === null) return
    const own = { ...typed.value.own }
    for (const [id, { uploadId, set }] of Object.entries(sets)) {
      const file = matrices.files.value.find(candidate => candidate.uploadId === uploadId)
      if (file !== undefined) own[id] = { ...JSON.parse(JSON.stringify(base)) as TypedGain, kind: 'stateSpace', ...placeOf(file, set) }
    }
    typed.value.own = own
    toasts.show(`${Object.keys(sets).length} conditions have matrices of their own; nothing is saved yet.`)
  }

  const takeSweep = (file: File) => told(async () => {
    const target = gain.value
    if (target === null) return
    const upload = await systemsClient.upload(systemId, file)
    await engine().keepUpload(upload.id, await file.text())
    const found = await engine().previewUpload(upload.id)
    const guess = found.guess ?? target.mapping ?? (found.columns.length >= 3
      ? { frequencyColumn: 0, frequencyUnit: 'Hz' as const, form: 'dB and degrees' as const, firstColumn: 1, secondColumn: 2, coherenceColumn: null, quantity: 'loopGain' as const }
      : null)
    Object.assign(target, { uploadId: upload.id, fileName: upload.fileName, mapping: guess === null ? null : { ...guess, quantity: 'loopGain' } })
    preview.value = found
  })

  return { matrices, preview, takeMatrices, setStates, assignSets, takeSweep }
}
