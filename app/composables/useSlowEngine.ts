import type { Remote } from 'comlink'
import type { Engine } from '~/workers/engine'

/** The engine in a worker of its own, for questions that take long: nobody's typing or figures wait behind them. */
export const useSlowEngine = (): () => Remote<Engine> => {
  const nuxt = useNuxtApp()
  return () => nuxt.$slowEngine()
}
