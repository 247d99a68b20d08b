import type { Ref } from 'vue'

/**
 * Keeps what is typed in `value` across a reload, a sign-out and an error, in this tab, under a name of its own for each person.
 * `restored` is true when an earlier draft was put back; `discard` forgets it, to be called once the server has it.
 */
export function useDraft<Value>(name: string, value: Ref<Value>) {
  const { person } = useSession()
  const restored = ref(false)
  const key = `draft:${person.value?.id ?? 'nobody'}:${name}`
  let watching = false
  let timer: ReturnType<typeof setTimeout> | undefined

  const write = () => sessionStorage.setItem(key, JSON.stringify(value.value))

  /** Puts back an earlier draft, and from now on writes down every change. */
  function start(): void {
    const kept = sessionStorage.getItem(key)
    if (kept !== null) {
      value.value = JSON.parse(kept) as Value
      restored.value = true
    }
    watching = true
  }

  function discard(): void {
    clearTimeout(timer)
    timer = undefined
    sessionStorage.removeItem(key)
    restored.value = false
  }

  watch(value, () => {
    if (!watching) return
    clearTimeout(timer)
    timer = setTimeout(() => {
      timer = undefined
      write()
    }, 200)
  }, { deep: true })

  onScopeDispose(() => {
    if (timer === undefined) return
    clearTimeout(timer)
    write()
  })

  return { restored, start, discard }
}
