import { ApiError } from '~/services/ApiError'

/** Reads something and keeps either it or why it could not be read; a newer reading overtakes an older one. */
export function useLoad<Value>(read: () => Promise<Value>) {
  const value = shallowRef<Value | null>(null)
  const error = shallowRef<ApiError | null>(null)
  let newest = 0

  async function load(): Promise<void> {
    const mine = ++newest
    error.value = null
    try {
      const answer = await read()
      if (mine === newest) value.value = answer
    }
    catch (failure) {
      if (mine === newest) error.value = ApiError.from(failure)
    }
  }

  return { value, error, load }
}
