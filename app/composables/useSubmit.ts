import { ApiError } from '~/services/ApiError'

/**
 * One form's way to the server: whether it is under way, what was refused, and the message for each field.
 * `errorAt('name')` gives the message whose path is that field; `formError` is a refusal that no field of the form shows.
 */
export function useSubmit() {
  const busy = ref(false)
  const error = shallowRef<ApiError | null>(null)
  // A field asks for its message when it is first drawn, so that by the time of a refusal all that show one are known.
  const shown = new Set<string>()

  function errorAt(field: string): string | undefined {
    shown.add(field)
    return error.value?.path === field ? error.value.message : undefined
  }

  const formError = computed(() => error.value !== null && !(error.value.path !== undefined && shown.has(error.value.path)) ? error.value : null)

  /** Runs it unless one is under way; resolves to whether it went through. */
  async function submit(work: () => Promise<void>): Promise<boolean> {
    if (busy.value) return false
    busy.value = true
    error.value = null
    try {
      await work()
      return true
    }
    catch (failure) {
      error.value = ApiError.from(failure)
      return false
    }
    finally {
      busy.value = false
    }
  }

  return { busy, error, errorAt, formError, submit }
}
