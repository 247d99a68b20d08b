import type { Remote } from 'comlink'
import type { Engine } from '~/workers/engine'

/** The engine in its worker; only in the browser, so ask for it in handlers and after mounting. */
export const useEngine = (): () => Remote<Engine> => {
  const nuxt = useNuxtApp()
  return () => nuxt.$engine()
}
