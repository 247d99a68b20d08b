import { fileURLToPath } from 'node:url'
import { bundleWorker } from '../../scripts/workers/bundleWorker.mjs'

/** Bundles the analysis worker once: services analyse in threads here as they do when served. */
export default async function setup(): Promise<void> {
  const file = fileURLToPath(new URL('../../.cache/tests/analysis-worker.mjs', import.meta.url))
  await bundleWorker('analysis-worker', file)
  process.env.WIDEBERTH_ANALYSIS_WORKER = file
  // What goes wrong on purpose here is not printed among the results.
  process.env.WIDEBERTH_LOG ??= 'silent'
}
