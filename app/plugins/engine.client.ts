import { wrap, type Remote } from 'comlink'
import type { Engine } from '~/workers/engine'

/** The engine in its workers, each started when the first screen asks for it. */
export default defineNuxtPlugin(() => {
  const inWorker = () => {
    let remote: Remote<Engine> | null = null
    return (): Remote<Engine> => remote ??= wrap<Engine>(new Worker(new URL('../workers/engine.worker.ts', import.meta.url), { type: 'module', name: 'engine' }))
  }
  return { provide: { engine: inWorker(), slowEngine: inWorker() } }
})
