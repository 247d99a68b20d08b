import { availableParallelism } from 'node:os'
import { fileURLToPath } from 'node:url'
import PQueue from 'p-queue'
import { Piscina } from 'piscina'
import type { AnalysisFailure, LoopAnalysis } from '#shared/types/analysis'
import { logger } from '../../log/logger'

/** All cores but the one that answers requests. */
const threads = Math.max(1, availableParallelism() - 1)

/** What is let into the pool starts at once, so that the time of an analysis begins when its work does. */
const gate = new PQueue({ concurrency: threads })

let pool: Piscina | undefined

/** The bundle stands beside the server's entry (see modules/workers.ts); tests name one of their own. */
const workerFile = () => process.env.WIDEBERTH_ANALYSIS_WORKER || fileURLToPath(new URL('./analysis-worker.mjs', import.meta.url))

/** Analyses one entry of the contract in a thread of its own. */
export const analyseInPool = (value: unknown, longest = 60_000) => runInPool('analysis', value, longest) as Promise<LoopAnalysis | AnalysisFailure>

/**
 * Has one of the worker's functions answer in a thread of its own, so that requests are answered meanwhile. Never throws for an input: what takes longer than
 * `longest` (ms) is stopped with its thread, and what breaks off says so. What is `patient` lets all others go first that wait for a thread.
 */
export function runInPool(task: string, value: unknown, longest = 60_000, { patient = false } = {}): Promise<unknown> {
  return gate.add(async () => {
    pool ??= new Piscina({ filename: workerFile(), minThreads: 1, maxThreads: threads, idleTimeout: 60_000 })
    const stop = new AbortController()
    const timer = setTimeout(() => stop.abort(), longest)
    try {
      return await pool.run(value, { signal: stop.signal, ...task !== 'analysis' && { name: task } }) as unknown
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
  }, { priority: patient ? -1 : 0 })
}

/** Ends the threads. */
export async function closeAnalysisPool(): Promise<void> {
  const closing = pool
  pool = undefined
  await closing?.destroy()
}
