import { availableParallelism } from 'node:os'
import { fileURLToPath } from 'node:url'
import { Piscina } from 'piscina'
import type { AnalysisFailure, LoopAnalysis } from '#shared/types/analysis'
import { logger } from '../../log/logger'

/** ms; an analysis that takes longer is stopped with its thread, and says so */
const longest = 60_000

let pool: Piscina | undefined

/** The bundle stands beside the server's entry (see modules/workers.ts); tests name one of their own. */
const workerFile = () => process.env.WIDEBERTH_ANALYSIS_WORKER || fileURLToPath(new URL('./analysis-worker.mjs', import.meta.url))

/** All cores but the one that answers requests. */
const threads = Math.max(1, availableParallelism() - 1)

/** Analyses one entry of the contract in a thread of its own, so that requests are answered meanwhile. Never throws for an input. */
export async function analyseInPool(value: unknown): Promise<LoopAnalysis | AnalysisFailure> {
  pool ??= new Piscina({ filename: workerFile(), minThreads: 1, maxThreads: threads, idleTimeout: 60_000 })
  // The time begins when the work does: what waits in the queue is not late.
  const stop = new AbortController()
  let timer: NodeJS.Timeout | undefined
  try {
    const running = pool.run(value, { signal: stop.signal })
    timer = setTimeout(() => stop.abort(), longest * (1 + Math.ceil(pool.queueSize / threads)))
    return await running as LoopAnalysis | AnalysisFailure
  }
  catch (error) {
    logger.error({ err: error }, 'An analysis broke off.')
    const message = stop.signal.aborted
      ? `The analysis took longer than ${longest / 1000} s and was stopped.`
      : 'The analysis broke off by a fault of the engine; the input may be in order.'
    return { error: { message, path: '' } }
  }
  finally {
    clearTimeout(timer)
  }
}

/** Ends the threads. */
export async function closeAnalysisPool(): Promise<void> {
  const closing = pool
  pool = undefined
  await closing?.destroy()
}
