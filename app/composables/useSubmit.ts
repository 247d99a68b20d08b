import { ApiError } from '~/services/ApiError'

/**
 * One form's way to the server: whether it is under way, what was refused, and the message for each field.
 * `errorAt('name')` gives the message whose path is that field; `formError` is a message that belongs to none of the fields asked for.
 */
export function useSubmit(fields: readonly string[] = []) {
  const busy = ref(false)
  const error = shallowRef<ApiError | null>(null)
  const errorAt = (field: string) => error.value?.path === field ? error.value.message : undefined
  const formError = computed(() => error.value !== null && !fields.includes(error.value.path ?? '') ? error.value : null)

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
