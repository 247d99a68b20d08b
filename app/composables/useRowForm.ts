import type { Ref } from 'vue'
import type { ApiError } from '~/services/ApiError'

interface Kept<Fields> {
  /** version of the row the fields were typed over; null for a new row */
  version: number | null
  fields: Fields
}

interface RowFormOptions<Fields, Row> {
  /** name of the draft, unique for the row */
  draftName: () => string
  /** the row that is edited, null for a new one */
  row: () => (Row & { version: number }) | null
  /** fields of a row, or those a new one begins with */
  fieldsOf: (row: Row | null) => Fields
  create: (fields: Fields) => Promise<unknown>
  change: (fields: Fields & { version: number }) => Promise<unknown>
}

/**
 * The form of one versioned row: what is typed is kept as a draft, and a row that somebody else changed meanwhile is not
 * overwritten: `conflict` then holds the fields as the other left them, and the person keeps its own or takes theirs.
 */
export function useRowForm<Fields extends object, Row>(options: RowFormOptions<Fields, Row>) {
  const kept = ref({ version: options.row()?.version ?? null, fields: options.fieldsOf(options.row()) }) as Ref<Kept<Fields>>
  const fields = computed({
    get: () => kept.value.fields,
    set: (value) => {
      kept.value = { ...kept.value, fields: value }
    },
  })
  const draft = useDraft(options.draftName(), kept)
  const { busy, error, errorAt, formError: refusal, submit } = useSubmit()
  const conflict = shallowRef<{ version: number, fields: Fields } | null>(null)
  const formError = computed(() => conflict.value === null ? refusal.value : null)
  onMounted(draft.start)

  function reset(): void {
    kept.value = { version: options.row()?.version ?? null, fields: options.fieldsOf(options.row()) }
    conflict.value = null
    error.value = null
    void nextTick(draft.discard)
  }

  /** Resolves to whether it was saved. */
  async function save(): Promise<boolean> {
    conflict.value = null
    const saved = await submit(async () => {
      const { version, fields } = kept.value
      await (version === null ? options.create(fields) : options.change({ ...fields, version }))
    })
    if (saved) {
      await nextTick()
      draft.discard()
    }
    else if (error.value?.code === 'conflict') {
      conflict.value = currentOf(error.value)
    }
    return saved
  }

  function currentOf(refused: ApiError): { version: number, fields: Fields } | null {
    const { details } = refused
    if (typeof details !== 'object' || details === null || !('current' in details)) return null
    const current = details.current as Row & { version: number }
    return { version: current.version, fields: options.fieldsOf(current) }
  }

  /** Saves the own fields over what the other wrote. */
  async function keepMine(): Promise<boolean> {
    if (conflict.value === null) return false
    kept.value = { version: conflict.value.version, fields: kept.value.fields }
    return save()
  }

  function takeTheirs(): void {
    if (conflict.value === null) return
    kept.value = { ...conflict.value }
    conflict.value = null
    error.value = null
  }

  return { fields, busy, errorAt, formError, conflict, restored: draft.restored, reset, save, keepMine, takeTheirs }
}
