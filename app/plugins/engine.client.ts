import { wrap, type Remote } from 'comlink'
import type { Engine } from '~/workers/engine'

/** The engine in its worker, started when the first screen asks for it. */
export default defineNuxtPlugin(() => {
  let remote: Remote<Engine> | null = null
  const engine = (): Remote<Engine> => {
    remote ??= wrap<Engine>(new Worker(new URL('../workers/engine.worker.ts', import.meta.url), { type: 'module', name: 'engine' }))
    return remote
  }
  return { provide: { engine } }
})
