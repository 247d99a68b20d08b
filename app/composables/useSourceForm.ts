import { conditionsClient } from '~/services/conditionsClient'
import { systemsClient } from '~/services/systemsClient'
import { emptySource, readTypedSource, typedSource, type TypedSource } from '~/services/TypedSource'
import { useLoopStore } from '~/stores/loop'
import { useToastStore } from '~/stores/toasts'

interface SourcePlace {
  loopId: number
  /** null for a new source */
  sourceId: number | null
  /** the condition looked at; of a stored source its own */
  conditionId: number | null
}

interface Kept {
  version: number | null
  typed: TypedSource
  /** values of parameters typed here, by name */
  values: Record<string, string>
  conditionIds: number[]
  ofRecord: boolean
  setAsideReason: string
}

/**
 * The form of a source of a loop's gain: what is typed, kept as a draft; what the engine says of it meanwhile; and the way to the
 * server: the file of a measured response first, then the parameters typed beside an expression, then the source.
 */
export function useSourceForm({ loopId, sourceId, conditionId }: SourcePlace) {
  const store = useLoopStore()
  const toasts = useToastStore()

  const kept = ref<Kept>({ version: null, typed: emptySource(), values: {}, conditionIds: [], ofRecord: true, setAsideReason: '' })
  const draft = useDraft(`source:${loopId}:${sourceId ?? `new:${conditionId}`}`, kept)
  const begun = ref(false)
  const asBegun = ref('')
  const file = shallowRef<File | null>(null)

  const detail = computed(() => store.loopId === loopId ? store.detail : null)
  const stored = computed(() => detail.value?.sources.find(source => source.id === sourceId) ?? null)
  const condition = computed(() => {
    const wanted = stored.value?.conditionId ?? conditionId
    return detail.value?.conditions.find(candidate => candidate.id === wanted) ?? detail.value?.conditions[0] ?? null
  })
  const others = computed(() => detail.value?.sources.filter(source => source.conditionId === condition.value?.id && source.id !== sourceId) ?? [])
  const base = computed(() => `/systems/${detail.value?.system.id}/loops/${loopId}`)
  const back = computed(() => `${base.value}?condition=${condition.value?.id ?? ''}`)
  const unsaved = computed(() => begun.value && JSON.stringify(kept.value) !== asBegun.value)
  useUnsavedChanges(unsaved, () => draft.discard())

  function asStored(): Kept {
    const source = stored.value
    if (source !== null) return { version: source.version, typed: typedSource(source.name, source.definition), values: {}, conditionIds: [source.conditionId], ofRecord: source.ofRecord, setAsideReason: source.setAsideReason }
    return { version: null, typed: { ...emptySource(), name: others.value.length === 0 ? 'design model' : '' }, values: {}, conditionIds: condition.value === null ? [] : [condition.value.id], ofRecord: others.value.length === 0, setAsideReason: '' }
  }

  async function begin() {
    await store.open(loopId)
    if (store.detail === null) return
    kept.value = asStored()
    asBegun.value = JSON.stringify(kept.value)
    await nextTick()
    draft.start()
    begun.value = true
    const upload = kept.value.typed.upload?.id ?? (stored.value?.definition.kind === 'measured' ? stored.value.definition.uploadId : null)
    if (upload !== null) await openStoredFile(upload)
  }
  onMounted(begin)

  async function openStoredFile(uploadId: number) {
    try {
      const bytes = await $fetch<Blob>(`/api/uploads/${uploadId}`, { responseType: 'blob' })
      await live.openFile(bytes)
    }
    catch (error) {
      toasts.fail(error)
    }
  }

  async function beginAfresh() {
    kept.value = asStored()
    asBegun.value = JSON.stringify(kept.value)
    await nextTick()
    draft.discard()
  }

  /** Values in the condition looked at: those typed here over those stored. */
  const parameters = computed(() => {
    const id = condition.value?.id
    const texts = new Map<string, string>()
    for (const { name, values } of detail.value?.parameters ?? []) {
      if (id !== undefined && values[id] !== undefined) texts.set(name, String(values[id]))
    }
    for (const [name, text] of Object.entries(kept.value.values)) texts.set(name, text)
    return Object.fromEntries([...texts].flatMap(([name, text]) => {
      const value = parseNumberText(text)
      return value === null || Number.isNaN(value) ? [] : [[name, value]]
    })) as Record<string, number>
  })
  const blocks = computed(() => detail.value?.blocks ?? [])
  // They may be large: asked for once they can be needed, and for one condition.
  const loadedGains = useLatest((conditionId: number) => conditionsClient.gains(conditionId))
  const gains = computed(() => loadedGains.answer.value ?? {})
  watch(() => blocks.value.length === 0 ? null : condition.value?.id ?? null, id => id === null ? undefined : loadedGains.ask(id), { immediate: true })
  watch(loadedGains.failure, failure => failure === null ? undefined : toasts.fail(failure))
  const used = computed(() => kept.value.typed.kind === 'expression' && condition.value !== null ? blocksUsed(kept.value.typed.expression, blocks.value, condition.value.id) : [])
  const sampling = computed(() => {
    const words = samplingInWords(used.value.map(({ block, definition }) => ({ name: block.name, definition })))
    const isHeld = used.value.some(({ definition }) => definition?.kind === 'hold')
    return words !== null && isHeld ? `${words}; continuous blocks behind the hold are taken by their exact discrete equivalent` : words
  })
  const completion = computed(() => completionNames({ blocks: blocks.value, parameters: detail.value?.parameters ?? [], gains: gains.value, conditionId: condition.value?.id ?? null }))
  /** parameters that the expression itself names */
  const names = computed(() => kept.value.typed.kind === 'expression' ? namesUsed(kept.value.typed.expression).filter(name => !blocks.value.some(block => block.name === name)) : [])
  const facts = computed(() => detail.value === null || !begun.value || loadedGains.pending.value
    ? null
    : {
        title: `${detail.value.loop.code} ${detail.value.loop.name}`,
        frequencyUnit: detail.value.system.frequencyUnit,
        parameters: parameters.value,
        parameterNames: [...new Set([...detail.value.parameters.map(parameter => parameter.name), ...Object.keys(parameters.value)])],
        blockNames: blocks.value.map(block => block.name),
        missingGains: kept.value.typed.kind === 'expression' ? missingGains(kept.value.typed.expression, used.value, condition.value?.name ?? '') : [],
        criteria: detail.value.criteria,
      })
  const live = useLiveSource(() => kept.value.typed, facts, gains)
  const { answer, preview } = live

  async function takeFile(chosen: File) {
    file.value = chosen
    if (['', 'design model'].includes(kept.value.typed.name)) kept.value.typed.name = chosen.name.replace(/\.[^.]+$/, '')
    kept.value.typed.upload = null
    // What was said of the columns before a reload is kept for the file that is chosen again.
    const said = preview.value === null ? kept.value.typed.mapping : null
    try {
      const found = await live.openFile(chosen)
      kept.value.typed.mapping = said ?? found.guess ?? kept.value.typed.mapping ?? (found.columns.length >= 3
        ? { frequencyColumn: 0, frequencyUnit: 'Hz', form: 'dB and degrees', firstColumn: 1, secondColumn: 2, coherenceColumn: null, quantity: 'loopGain' }
        : null)
    }
    catch (error) {
      toasts.fail(error)
    }
  }
  const fileName = computed(() => file.value?.name ?? kept.value.typed.upload?.fileName ?? (preview.value === null ? null : 'The stored file'))
  const rowProblems = computed(() => answer.value?.rows.length ? answer.value.rows : kept.value.typed.mapping === null ? preview.value?.rejectedRows ?? [] : [])

  const { busy, error, errorAt, formError, submit } = useSubmit()
  /** Empty fields are told only once one has tried to save. */
  const tried = ref(false)
  function fieldError(path: string): string | undefined {
    const refused = errorAt(`definition.${path}`) ?? errorAt(path)
    if (refused !== undefined) return refused
    const problem = live.problemAt(path)
    return problem !== undefined && (tried.value || !problem.startsWith('Type ')) ? problem : undefined
  }
  const shownPaths = ['expression', 'numerator', 'denominator', 'zeros', 'poles', 'gain', 'deadTime', 'sampleTime', 'mapping', 'averages', 'openLoopUnstablePoles', 'openLoopOriginPoles', 'amplitude', 'measured.averages']
  const otherProblems = computed(() => (answer.value?.problems ?? []).filter(({ path, message }) => (!shownPaths.includes(path.replace(/\[.*/, '')) || path === 'expression') && (tried.value || !message.startsWith('Type '))))

  const conflict = computed(() => error.value?.code === 'conflict')

  const save = () => submit(async () => {
    tried.value = true
    if (detail.value === null) return
    const typed = kept.value.typed
    if (typed.kind === 'measured' && file.value !== null && typed.upload === null && rowProblems.value.length === 0) {
      typed.upload = await systemsClient.upload(detail.value.system.id, file.value)
    }
    const storedUpload = stored.value?.definition.kind === 'measured' ? stored.value.definition.uploadId : 0
    const read = readTypedSource(typed, typed.upload?.id ?? storedUpload)
    if ('problems' in read) throw new Error(read.problems[0]?.message ?? 'Something is missing.')
    if (read.definition.kind === 'measured' && read.definition.uploadId === 0) throw new Error('Choose the file of the measured response.')
    const values = Object.fromEntries(Object.entries(kept.value.values).filter(([name]) => names.value.includes(name)))
    const list = condition.value === null
      ? null
      : parametersWithValues({ parameters: detail.value.parameters, values, conditionId: condition.value.id, newIn: kept.value.conditionIds })
    if (list !== null) {
      await systemsClient.putParameters(detail.value.system.id, list, detail.value.parameters.map(({ id }) => id))
      // So that a second try, after the source was refused, begins from the parameters as they are now.
      await store.load()
    }
    const { conditionIds, ofRecord, setAsideReason, version } = kept.value
    if (sourceId === null) await store.createSources({ conditionIds, name: typed.name, definition: read.definition, ofRecord, setAsideReason: ofRecord ? '' : setAsideReason })
    else await store.changeSource(sourceId, { version: version ?? 0, name: typed.name, definition: read.definition, setAsideReason })
  }).then(async (saved) => {
    if (!saved) return
    asBegun.value = JSON.stringify(kept.value)
    await nextTick()
    draft.discard()
    toasts.show(`'${kept.value.typed.name}' is saved.`)
    await navigateTo(back.value)
  })

  /** Over what somebody else saved meanwhile: from the newest versions on, with what stands here. */
  async function keepMine() {
    await store.load()
    if (stored.value !== null) kept.value.version = stored.value.version
    await save()
  }
  async function takeTheirs() {
    error.value = null
    await store.load()
    await beginAfresh()
  }

  return {
    kept, detail, stored, condition, others, names, used, sampling, completion, back, unsaved, begun, begin, beginAfresh, restored: draft.restored,
    live, fileName, takeFile, rowProblems, fieldError, otherProblems,
    busy, errorAt, formError, conflict, save, keepMine, takeTheirs,
  }
}
