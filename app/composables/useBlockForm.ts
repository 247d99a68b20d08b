import type { Block, BlockDefinition } from '#shared/types/block'
import { ApiError } from '~/services/ApiError'
import { blocksClient } from '~/services/blocksClient'
import { systemsClient } from '~/services/systemsClient'
import { newBlock, readTypedBlock, typedBlock, type TypedBlock } from '~/services/TypedBlock'
import { emptyGain, type TypedGain } from '~/services/TypedGain'
import { useSystemStore } from '~/stores/system'
import { useToastStore } from '~/stores/toasts'

interface BlockPlace {
  systemId: number
  /** null for a new block */
  blockId: number | null
  /** the block that a new one is copied from */
  fromId: number | null
}

interface Kept {
  version: number | null
  typed: TypedBlock
  /** 'every', or the id of the condition whose own gain is looked at */
  at: string
}

/**
 * The form of a block: what is typed, kept as a draft; the gain looked at, shared or of one condition; what the engine says of it meanwhile, what it would
 * move; and the way to the server. Files are stored as they are dropped, everything else on saving.
 */
export function useBlockForm({ systemId, blockId, fromId }: BlockPlace) {
  const store = useSystemStore()
  const toasts = useToastStore()
  const { value: inUse, load: loadUse } = useLoad(() => blocksClient.list(systemId))
  const { value: parameters, error: parametersError, load: loadParameters } = useLoad(() => systemsClient.parameters(systemId))

  const kept = ref<Kept>({ version: null, typed: newBlock('Hz'), at: 'every' })
  const draft = useDraft(`block:${systemId}:${blockId ?? `new:${fromId ?? ''}`}`, kept)
  const begun = ref(false)
  const asBegun = ref('')
  const textOf = () => JSON.stringify({ version: kept.value.version, typed: kept.value.typed })

  const detail = computed(() => store.systemId === systemId ? store.detail : null)
  const unit = computed(() => detail.value?.system.frequencyUnit ?? 'Hz')
  const conditions = computed(() => detail.value?.conditions ?? [])
  const stored = computed(() => detail.value?.blocks.find(block => block.id === blockId) ?? null)
  /** the loops and blocks that name it */
  const usage = computed(() => inUse.value?.find(block => block.id === blockId) ?? null)
  const back = `/systems/${systemId}/set-up?part=blocks`
  const unsaved = computed(() => begun.value && textOf() !== asBegun.value)
  useUnsavedChanges(unsaved, () => draft.discard())

  function asStored(): Kept {
    if (stored.value !== null) return { version: stored.value.version, typed: typedBlock(stored.value, unit.value), at: firstGainOf(stored.value) }
    const from = detail.value?.blocks.find(block => block.id === fromId)
    return { version: null, typed: from === undefined ? newBlock(unit.value) : { ...typedBlock(from, unit.value), name: freeName(from.name) }, at: from === undefined ? 'every' : firstGainOf(from) }
  }
  /** Where a block has no gain in every condition, the first that has one is looked at. */
  function firstGainOf({ definition, byCondition }: Block): string {
    const own = definition !== null ? undefined : conditions.value.find(({ id }) => byCondition[id] !== undefined)
    return own === undefined ? 'every' : String(own.id)
  }
  /** C becomes C_2 */
  function freeName(name: string): string {
    const taken = new Set(detail.value?.blocks.map(block => block.name))
    let count = 2
    while (taken.has(`${name}_${count}`)) count++
    return `${name}_${count}`
  }

  async function begin() {
    await Promise.all([store.open(systemId), loadParameters(), loadUse()])
    if (detail.value === null || parameters.value === null) return
    kept.value = asStored()
    asBegun.value = textOf()
    await nextTick()
    draft.start()
    begun.value = true
  }
  onMounted(begin)

  async function beginAfresh() {
    kept.value = asStored()
    asBegun.value = textOf()
    await nextTick()
    draft.discard()
  }

  const typed = computed(() => kept.value.typed)
  const condition = computed(() => conditions.value.find(({ id }) => String(id) === kept.value.at) ?? null)
  const isShared = computed(() => condition.value === null)
  /** the gain looked at; null where this condition has none of its own, or none is shared */
  const gain = computed({
    get: () => condition.value === null ? typed.value.shared : typed.value.own[condition.value.id] ?? null,
    set: (value: TypedGain | null) => {
      if (condition.value === null) typed.value.shared = value
      else if (value !== null) typed.value.own = { ...typed.value.own, [condition.value.id]: value }
      else typed.value.own = Object.fromEntries(Object.entries(typed.value.own).filter(([id]) => id !== String(condition.value?.id)))
    },
  })
  const path = computed(() => condition.value === null ? 'definition' : `byCondition.${condition.value.id}`)
  /** A gain of its own begins as what it takes the place of. */
  function giveOwn() {
    gain.value = JSON.parse(JSON.stringify((condition.value === null ? Object.values(typed.value.own)[0] : typed.value.shared) ?? emptyGain(unit.value))) as TypedGain
  }

  /** The condition in which a gain is looked at: its own, or for the shared one the first without one of its own. */
  const shownIn = computed(() => condition.value ?? conditions.value.find(({ id }) => typed.value.own[id] === undefined) ?? conditions.value[0] ?? null)
  const values = computed(() => Object.fromEntries((parameters.value ?? []).flatMap(({ name, values }) => {
    const value = shownIn.value === null ? undefined : values[shownIn.value.id]
    return value === undefined ? [] : [[name, value]]
  })) as Record<string, number>)
  const others = computed(() => Object.fromEntries((detail.value?.blocks ?? []).flatMap((block) => {
    const definition = (shownIn.value === null ? undefined : block.byCondition[shownIn.value.id]) ?? block.definition
    return block.id === blockId || definition === null ? [] : [[block.name, definition]]
  })) as Record<string, BlockDefinition>)
  const channel = ref({ input: 0, output: 0 })
  /** the gain that the figure beside shows: where a condition has none of its own, the shared one */
  const shownGain = computed(() => gain.value ?? typed.value.shared)
  const live = useLiveBlock(shownGain, () => !begun.value
    ? null
    : {
        name: /^[A-Za-z]\w*$/.test(typed.value.name.trim()) ? typed.value.name.trim() : 'block',
        frequencyUnit: unit.value, channel: channel.value, others: others.value, parameters: values.value,
        parameterNames: (parameters.value ?? []).map(({ name }) => name),
      })

  const read = computed(() => readTypedBlock(typed.value))
  const isChanged = computed(() => JSON.stringify(typed.value) !== (stored.value === null ? '' : JSON.stringify(typedBlock(stored.value, unit.value))))
  const moved = useBlockEffects(systemId, () => {
    if (!begun.value || blockId === null || !isChanged.value || !('fields' in read.value) || live.answer.value?.faults.length) return null
    const { name, role, definition, byCondition } = read.value.fields
    return { blockId, name, role, definition, byCondition }
  })

  const { busy, error, errorAt, formError, submit } = useSubmit()
  /** Empty fields are told only once one has tried to save. */
  const tried = ref(false)
  /** Tables tell what is wrong with each of their cells; of a list in one field an entry's fault is that of the field. */
  const isAt = (found: string | undefined, wanted: string) => found === wanted || (!/(?:rows|modes)$/.test(wanted) && (found?.startsWith(`${wanted}[`) === true || found?.startsWith(`${wanted}.`) === true))
  /** What is wrong with a field of the gain looked at; entries such as 'zeros[2]' belong to the field 'zeros'. */
  function gainError(field: string): string | undefined {
    const wanted = `${path.value}.${field}`
    const refused = [error.value, moved.refusal.value].find(refusal => refusal !== null && isAt(refusal.path, wanted))
    if (refused) return refused.message
    const problem = gain.value === null ? undefined : live.answer.value?.problems.find(problem => isAt(problem.path, field))
    return problem !== undefined && (tried.value || !problem.message.startsWith('Type ')) ? problem.message : undefined
  }
  const faults = computed(() => {
    const refused = [error.value, moved.refusal.value].find(refusal => refusal?.path === `${path.value}.expression`)
    const { faults = [] } = live.answer.value ?? {}
    const details: unknown = refused?.details
    const position = typeof details === 'object' && details !== null && 'position' in details && typeof details.position === 'number' ? details.position : 0
    return refused && faults.length === 0 ? [{ message: refused.message, position }] : faults
  })
  /** Problems that stand at no field: of other blocks, of the matrices. */
  const otherProblems = computed(() => (live.answer.value?.problems ?? []).filter(({ path }) => path.startsWith('blocks.') || path.startsWith('stateSpace')).map(({ message }) => message).filter(message => !faults.value.some(fault => fault.message === message)))
  // What was refused is no longer said of what is typed since.
  watch(() => JSON.stringify(typed.value), () => {
    if (error.value?.path !== undefined && !conflict.value) error.value = null
  })

  /** A name that is taken is a conflict too, told at its field. */
  const conflict = computed(() => error.value?.code === 'conflict' && error.value.path === 'version')

  /** Goes to the gain at which a refusal stands. */
  function goTo(found: string | undefined) {
    const own = /^byCondition\.(\d+)/.exec(found ?? '')
    if (own) kept.value.at = own[1]!
    else if (found?.startsWith('definition')) kept.value.at = 'every'
  }
  const whereWords = (found: string | undefined) => {
    const id = /^byCondition\.(\d+)/.exec(found ?? '')?.[1]
    const code = conditions.value.find(condition => String(condition.id) === id)?.code
    return code === undefined ? '' : `In ${code}: `
  }

  const save = () => submit(async () => {
    tried.value = true
    // Blank rows would shift the places at which the server tells a fault.
    for (const gain of [typed.value.shared, ...Object.values(typed.value.own)]) dropBlankRows(gain)
    const found = read.value
    if ('problems' in found) {
      const [first] = found.problems
      throw new ApiError('invalidInput', first?.message ?? 'Something is missing.', first?.path)
    }
    if (blockId === null) await store.createBlock(found.fields)
    else await store.changeBlock(blockId, { version: kept.value.version ?? 0, ...found.fields })
  }).then(async (saved) => {
    if (!saved) return goTo(error.value?.path)
    asBegun.value = textOf()
    await nextTick()
    draft.discard()
    toasts.show(`Block ${typed.value.name.trim()} is saved.`)
    await navigateTo(back)
  })

  /** Over what somebody else saved meanwhile: from the newest version on, with what stands here. */
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

  const loadError = computed(() => store.error ?? parametersError.value)
  return {
    kept, typed, detail, stored, usage, conditions, condition, isShared, gain, shownGain, shownIn, parameters, values, others, channel, back, unsaved, begun, begin, beginAfresh, loadError, restored: draft.restored,
    giveOwn, live, moved, isChanged, gainError, faults, otherProblems, tried, busy, errorAt, formError, conflict, save, keepMine, takeTheirs, whereWords, error,
  }
}

function dropBlankRows(gain: TypedGain | null): void {
  if (gain === null) return
  const isTyped = (cells: readonly string[]) => cells.some(cell => cell.trim() !== '')
  const rows = gain.rows.filter(row => isTyped(row.filter((_, column) => column !== 3)))
  if (rows.length > 0) gain.rows = rows
  const modes = gain.modes.filter(mode => isTyped([mode.name, mode.frequency, mode.damping, ...mode.gainIn, ...mode.gainOut]))
  if (modes.length > 0) gain.modes = modes
  gain.rigid = gain.rigid.filter(term => isTyped([...term.gainIn, ...term.gainOut]))
}
