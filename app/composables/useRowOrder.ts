import type { Ref } from 'vue'

/**
 * Rows that are reordered by dragging or by buttons: `rows` is the order as shown, at once; `commit` gets the ids when a move ends.
 * While a commit is under way or after it failed, the order shown is that of `source` again as soon as it changes.
 */
export function useRowOrder<Row extends { id: number }>(source: Readonly<Ref<readonly Row[]>>, commit: (ids: number[]) => Promise<unknown>) {
  const order = ref<number[] | null>(null)
  const dragged = ref<number | null>(null)
  const said = ref('')

  const rows = computed<Row[]>(() => {
    if (order.value === null) return [...source.value]
    const places = order.value
    return [...source.value].sort((a, b) => places.indexOf(a.id) - places.indexOf(b.id))
  })
  watch(source, () => {
    order.value = null
  })

  async function end(): Promise<void> {
    const ids = order.value
    dragged.value = null
    if (ids === null) return
    try {
      await commit(ids)
    }
    finally {
      order.value = null
    }
  }

  function put(id: number, place: number): boolean {
    const ids = rows.value.map(row => row.id)
    const from = ids.indexOf(id)
    if (from < 0 || place < 0 || place >= ids.length || place === from) return false
    ids.splice(from, 1)
    ids.splice(place, 0, id)
    order.value = ids
    return true
  }

  /** Moves a row by so many places and commits; what screen readers hear stands in `said`. */
  async function move(id: number, by: number): Promise<void> {
    const place = rows.value.findIndex(row => row.id === id) + by
    if (!put(id, place)) return
    said.value = `Moved to place ${place + 1} of ${rows.value.length}.`
    await end()
  }

  const drag = {
    start: (id: number, event: DragEvent) => {
      dragged.value = id
      event.dataTransfer?.setData('text/plain', String(id))
      if (event.dataTransfer) event.dataTransfer.effectAllowed = 'move'
    },
    over: (id: number, event: DragEvent) => {
      if (dragged.value === null) return
      event.preventDefault()
      if (dragged.value !== id) put(dragged.value, rows.value.findIndex(row => row.id === id))
    },
    end,
  }

  return { rows, dragged, said, move, drag }
}
